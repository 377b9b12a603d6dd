import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { IsNotEmpty, IsString, MaxLength } from 'class-validator';
import { IsNewPassword } from '../auth/passwords.js';
import { PageOf } from '../common/paging.js';

export class AccountDto {
  @ApiProperty() id: string;
  @ApiProperty() name: string;
  @ApiProperty() email: string;
}

export class AccountChangeDto {
  @ApiProperty()
  @IsString({ message: 'must be text' })
  @IsNotEmpty({ message: 'must not be empty' })
  @MaxLength(120, { message: 'must have at most 120 characters' })
  name: string;
}

export class PasswordChangeDto {
  @ApiProperty()
  @IsString({ message: 'must be text' })
  current: string;

  @ApiProperty()
  @IsNewPassword()
  next: string;
}

export class NewTokenDto {
  @ApiProperty()
  @IsString({ message: 'must be text' })
  @IsNotEmpty({ message: 'must not be empty' })
  @MaxLength(120, { message: 'must have at most 120 characters' })
  name: string;
}

export class TokenDto {
  @ApiProperty() id: string;
  @ApiProperty() name: string;
  @ApiProperty() createdAt: string;
  @ApiProperty({ type: String, nullable: true }) lastUsedAt: string | null;
  @ApiPropertyOptional({ description: 'the token itself, told once, when it is made' }) secret?: string;
}

export class SessionInfoDto {
  @ApiProperty() id: string;
  @ApiProperty() createdAt: string;
  @ApiProperty() lastUsedAt: string;
  @ApiProperty() userAgent: string;
  @ApiProperty({ description: 'the session that asks' }) current: boolean;
}

export class TokenPageDto extends PageOf(TokenDto) {}
export class SessionPageDto extends PageOf(SessionInfoDto) {}
