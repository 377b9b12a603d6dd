import { ApiProperty } from '@nestjs/swagger';
import { IsIn } from 'class-validator';
import { PageOf } from '../common/paging.js';
import { ROLES, type Role } from '../policy/policy.js';

export class MemberDto {
  @ApiProperty() id: string;
  @ApiProperty() userId: string;
  @ApiProperty() name: string;
  @ApiProperty() email: string;
  @ApiProperty({ enum: ROLES }) role: Role;
  @ApiProperty() joinedAt: string;
}

export class MemberPageDto extends PageOf(MemberDto) {}

export class RoleChangeDto {
  @ApiProperty({ enum: ROLES })
  @IsIn(ROLES, { message: `must be one of ${ROLES.join(', ')}` })
  role: Role;
}
