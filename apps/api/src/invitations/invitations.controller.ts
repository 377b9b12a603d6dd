import {
  Body,
  Controller,
  Delete,
  Get,
  HttpCode,
  Param,
  ParseUUIDPipe,
  Post,
  Req,
  Res,
  UseGuards,
} from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiParam, ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { SessionDto } from '../auth/auth.dto.js';
import { AuthService } from '../auth/auth.service.js';
import { setSessionCookies } from '../auth/cookies.js';
import { Public, type AuthenticatedRequest } from '../auth/principal.js';
import { SignedInUser } from '../auth/signed-in-user.js';
import { SessionsService } from '../auth/sessions.service.js';
import { NoContent } from '../common/decorators.js';
import { Can, InLab, LabGuard, type LabContext } from '../policy/lab.guard.js';
import { AcceptDto, InvitationDto, InvitationPageDto, InvitationViewDto, InviteDto } from './invitations.dto.js';
import { InvitationsService } from './invitations.service.js';

@ApiTags('invitations')
@ApiParam({ name: 'labId' })
@UseGuards(LabGuard)
@Controller('labs/:labId/invitations')
export class LabInvitationsController {
  constructor(private readonly invitations: InvitationsService) {}

  @Get()
  @Can('invitation.list')
  @ApiOkResponse({ type: InvitationPageDto })
  async list(@InLab() context: LabContext): Promise<InvitationPageDto> {
    return { items: await this.invitations.list(context), nextCursor: null };
  }

  @Post()
  @Can('invitation.edit')
  @ApiCreatedResponse({ type: InvitationDto })
  invite(@InLab() context: LabContext, @Body() body: InviteDto): Promise<InvitationDto> {
    return this.invitations.invite(context, body);
  }

  @Delete(':id')
  @Can('invitation.edit')
  @NoContent()
  withdraw(@InLab() context: LabContext, @Param('id', ParseUUIDPipe) id: string): Promise<void> {
    return this.invitations.withdraw(context, id);
  }
}

@ApiTags('invitations')
@Public()
@Controller('invitations/:token')
export class InvitationController {
  constructor(
    private readonly invitations: InvitationsService,
    private readonly sessions: SessionsService,
    private readonly auth: AuthService,
    private readonly signedIn: SignedInUser,
  ) {}

  @Get()
  @ApiOkResponse({ type: InvitationViewDto })
  view(@Param('token') token: string): Promise<InvitationViewDto> {
    return this.invitations.view(token);
  }

  @Post('accept')
  @HttpCode(200)
  @ApiOkResponse({ type: SessionDto })
  async accept(
    @Param('token') token: string,
    @Body() body: AcceptDto,
    @Req() request: AuthenticatedRequest,
    @Res({ passthrough: true }) response: Response,
  ): Promise<SessionDto> {
    const { userId, isNew } = await this.invitations.accept(token, body, await this.signedIn.of(request));
    if (isNew) {
      const tokens = await this.sessions.begin(userId, request.header('user-agent') ?? '');
      setSessionCookies(response, tokens, request.secure);
    }
    return this.auth.describe(userId);
  }
}
