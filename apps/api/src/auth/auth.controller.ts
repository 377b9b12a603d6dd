import { Body, Controller, Get, HttpCode, HttpStatus, Inject, Post, Req, Res, UseGuards } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { ThrottlerGuard } from '@nestjs/throttler';
import type { Response } from 'express';
import { NoContent } from '../common/decorators.js';
import { Problem } from '../common/problem.js';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { ResetConfirmDto, ResetRequestDto, SessionDto, SignInDto } from './auth.dto.js';
import { AuthService } from './auth.service.js';
import { clearSessionCookies, cookieOf, REFRESH_COOKIE, setSessionCookies, type SessionTokens } from './cookies.js';
import { Asker, Public, type AuthenticatedRequest, type Principal } from './principal.js';
import { SessionsService } from './sessions.service.js';

@ApiTags('auth')
@Controller('auth')
export class AuthController {
  constructor(
    @Inject(SETTINGS) private readonly settings: Settings,
    private readonly auth: AuthService,
    private readonly sessions: SessionsService,
  ) {}

  @Post('sign-in')
  @Public()
  @UseGuards(ThrottlerGuard)
  @HttpCode(HttpStatus.OK)
  @ApiOkResponse({ type: SessionDto })
  async signIn(
    @Body() { email, password }: SignInDto,
    @Req() request: AuthenticatedRequest,
    @Res({ passthrough: true }) response: Response,
  ): Promise<SessionDto> {
    const user = await this.auth.check(email, password);
    this.setCookies(response, await this.sessions.begin(user.id, request.header('user-agent') ?? ''));
    return this.auth.describe(user.id);
  }

  @Post('refresh')
  @Public()
  @HttpCode(HttpStatus.OK)
  @ApiOkResponse({ type: SessionDto })
  async refresh(
    @Req() request: AuthenticatedRequest,
    @Res({ passthrough: true }) response: Response,
  ): Promise<SessionDto> {
    const token = cookieOf(request, REFRESH_COOKIE);
    if (!token) throw new Problem(HttpStatus.UNAUTHORIZED, 'session-ended', 'Sign in to continue.');
    const { userId, ...tokens } = await this.sessions.rotate(token);
    this.setCookies(response, tokens);
    return this.auth.describe(userId);
  }

  @Post('sign-out')
  @Public()
  @NoContent()
  async signOut(@Req() request: AuthenticatedRequest, @Res({ passthrough: true }) response: Response): Promise<void> {
    const token = cookieOf(request, REFRESH_COOKIE);
    if (token) await this.sessions.endByRefresh(token);
    clearSessionCookies(response);
  }

  @Post('sign-out-everywhere')
  @NoContent()
  async signOutEverywhere(
    @Asker() { userId }: Principal,
    @Res({ passthrough: true }) response: Response,
  ): Promise<void> {
    await this.sessions.endAll(userId);
    clearSessionCookies(response);
  }

  @Get('session')
  @ApiOkResponse({ type: SessionDto })
  session(@Asker() { userId }: Principal): Promise<SessionDto> {
    return this.auth.describe(userId);
  }

  @Post('password-reset')
  @Public()
  @UseGuards(ThrottlerGuard)
  @NoContent()
  requestReset(@Body() { email }: ResetRequestDto): Promise<void> {
    return this.auth.requestReset(email);
  }

  @Post('password-reset/confirm')
  @Public()
  @UseGuards(ThrottlerGuard)
  @NoContent()
  confirmReset(@Body() { token, password }: ResetConfirmDto): Promise<void> {
    return this.auth.confirmReset(token, password);
  }

  private setCookies(response: Response, tokens: SessionTokens): void {
    setSessionCookies(response, tokens, this.settings.publicUrl.startsWith('https:'));
  }
}
