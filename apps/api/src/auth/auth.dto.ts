import { ApiProperty } from '@nestjs/swagger';
import { IsEmail, IsString, MaxLength } from 'class-validator';
import { ROLES, type Role } from '../policy/policy.js';
import { IsNewPassword } from './passwords.js';

export class SignInDto {
  @ApiProperty()
  @IsEmail({}, { message: 'must be an e-mail address' })
  email: string;

  @ApiProperty()
  @IsString({ message: 'must be text' })
  @MaxLength(200, { message: 'must have at most 200 characters' })
  password: string;
}

export class ResetRequestDto {
  @ApiProperty()
  @IsEmail({}, { message: 'must be an e-mail address' })
  email: string;
}

export class ResetConfirmDto {
  @ApiProperty()
  @IsString({ message: 'must be text' })
  token: string;

  @ApiProperty()
  @IsNewPassword()
  password: string;
}

export class SessionUserDto {
  @ApiProperty() id: string;
  @ApiProperty() name: string;
  @ApiProperty() email: string;
}

export class SessionMembershipDto {
  @ApiProperty() labId: string;
  @ApiProperty() labName: string;
  @ApiProperty({ enum: ROLES }) role: Role;
}

/** Who is signed in, and the labs they belong to. */
export class SessionDto {
  @ApiProperty({ type: SessionUserDto }) user: SessionUserDto;
  @ApiProperty({ type: [SessionMembershipDto] }) memberships: SessionMembershipDto[];
}
