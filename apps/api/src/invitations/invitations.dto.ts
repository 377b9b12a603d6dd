import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { IsEmail, IsIn, IsNotEmpty, IsOptional, IsString, MaxLength } from 'class-validator';
import { IsNewPassword } from '../auth/passwords.js';
import { PageOf } from '../common/paging.js';
import { ROLES, type Role } from '../policy/policy.js';

export class InviteDto {
  @ApiProperty()
  @IsEmail({}, { message: 'must be an e-mail address' })
  email: string;

  @ApiProperty({ enum: ROLES })
  @IsIn(ROLES, { message: `must be one of ${ROLES.join(', ')}` })
  role: Role;
}

export class InvitationDto {
  @ApiProperty() id: string;
  @ApiProperty() email: string;
  @ApiProperty({ enum: ROLES }) role: Role;
  @ApiProperty() createdAt: string;
  @ApiProperty() expiresAt: string;
  @ApiProperty() invitedBy: string;
}

export class InvitationPageDto extends PageOf(InvitationDto) {}

/** What the invited person sees. */
export class InvitationViewDto {
  @ApiProperty() labName: string;
  @ApiProperty() email: string;
  @ApiProperty({ enum: ROLES }) role: Role;
  @ApiProperty({ description: 'whether the address has no account yet' }) needsAccount: boolean;
}

/** Name and password of a new account; neither when there is one already. */
export class AcceptDto {
  @ApiPropertyOptional()
  @IsOptional()
  @IsString({ message: 'must be text' })
  @IsNotEmpty({ message: 'must not be empty' })
  @MaxLength(120, { message: 'must have at most 120 characters' })
  name?: string;

  @ApiPropertyOptional()
  @IsOptional()
  @IsNewPassword()
  password?: string;
}
