import { Body, Controller, Delete, Get, HttpCode, Param, ParseUUIDPipe, Patch, Post } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { Asker, type Principal } from '../auth/principal.js';
import { NoContent } from '../common/decorators.js';
import {
  AccountChangeDto,
  AccountDto,
  NewTokenDto,
  PasswordChangeDto,
  SessionPageDto,
  TokenDto,
  TokenPageDto,
} from './account.dto.js';
import { AccountService } from './account.service.js';
import { TokensService } from './tokens.service.js';

@ApiTags('account')
@Controller('account')
export class AccountController {
  constructor(
    private readonly account: AccountService,
    private readonly tokens: TokensService,
  ) {}

  @Get()
  @ApiOkResponse({ type: AccountDto })
  read(@Asker() { userId }: Principal): Promise<AccountDto> {
    return this.account.read(userId);
  }

  @Patch()
  @ApiOkResponse({ type: AccountDto })
  rename(@Asker() { userId }: Principal, @Body() { name }: AccountChangeDto): Promise<AccountDto> {
    return this.account.rename(userId, name);
  }

  @Post('password')
  @NoContent()
  changePassword(@Asker() asker: Principal, @Body() { current, next }: PasswordChangeDto): Promise<void> {
    return this.account.changePassword(asker, current, next);
  }

  @Get('tokens')
  @ApiOkResponse({ type: TokenPageDto })
  async listTokens(@Asker() { userId }: Principal): Promise<TokenPageDto> {
    return { items: await this.tokens.list(userId), nextCursor: null };
  }

  @Post('tokens')
  @HttpCode(201)
  @ApiCreatedResponse({ type: TokenDto })
  makeToken(@Asker() { userId }: Principal, @Body() { name }: NewTokenDto): Promise<TokenDto> {
    return this.tokens.make(userId, name);
  }

  @Delete('tokens/:id')
  @NoContent()
  revokeToken(@Asker() { userId }: Principal, @Param('id', ParseUUIDPipe) id: string): Promise<void> {
    return this.tokens.revoke(userId, id);
  }

  @Get('sessions')
  @ApiOkResponse({ type: SessionPageDto })
  async listSessions(@Asker() asker: Principal): Promise<SessionPageDto> {
    return { items: await this.account.listSessions(asker), nextCursor: null };
  }

  @Delete('sessions/:id')
  @NoContent()
  endSession(@Asker() { userId }: Principal, @Param('id', ParseUUIDPipe) id: string): Promise<void> {
    return this.account.endSession(userId, id);
  }
}
