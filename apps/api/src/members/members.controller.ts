import { Body, Controller, Delete, Get, Param, ParseUUIDPipe, Patch, UseGuards } from '@nestjs/common';
import { ApiOkResponse, ApiParam, ApiTags } from '@nestjs/swagger';
import { NoContent } from '../common/decorators.js';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { MemberDto, MemberPageDto, RoleChangeDto } from './members.dto.js';
import { MembersService } from './members.service.js';

@ApiTags('members')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId/members')
export class MembersController {
  constructor(private readonly members: MembersService) {}

  @Get()
  @Can('member.list')
  @ApiOkResponse({ type: MemberPageDto })
  async list(@InLab() context: LabContext): Promise<MemberPageDto> {
    return { items: await this.members.list(context), nextCursor: null };
  }

  @Patch(':memberId')
  @Can('member.edit')
  @ApiOkResponse({ type: MemberDto })
  changeRole(
    @InLab() context: LabContext,
    @Param('memberId', ParseUUIDPipe) memberId: string,
    @Body() { role }: RoleChangeDto,
  ): Promise<MemberDto> {
    return this.members.changeRole(context, memberId, role);
  }

  @Delete(':memberId')
  @Can('member.edit')
  @NoContent()
  remove(@InLab() context: LabContext, @Param('memberId', ParseUUIDPipe) memberId: string): Promise<void> {
    return this.members.remove(context, memberId);
  }
}
