import { HttpStatus, Injectable, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { AuthGuard as PassportGuard } from '@nestjs/passport';
import { Problem } from '../common/problem.js';
import { TokensService } from '../account/tokens.service.js';
import { PUBLIC, type AuthenticatedRequest, type Principal } from './principal.js';

const unauthorised = () => new Problem(HttpStatus.UNAUTHORIZED, 'unauthorized', 'Sign in to continue.');

/** Guards every route that is not marked Public: a personal token in the Authorization header, else the session's cookie. */
@Injectable()
export class AuthGuard extends PassportGuard('jwt') {
  constructor(
    private readonly reflector: Reflector,
    private readonly tokens: TokensService,
  ) {
    super();
  }

  override async canActivate(context: ExecutionContext): Promise<boolean> {
    if (this.reflector.getAllAndOverride<boolean>(PUBLIC, [context.getHandler(), context.getClass()])) return true;
    const request = context.switchToHttp().getRequest<AuthenticatedRequest>();
    const header = request.headers.authorization;
    if (header === undefined) return (await super.canActivate(context)) as boolean;
    const userId = await this.tokens.userOf(header.replace(/^Bearer /, ''));
    if (!userId) throw unauthorised();
    request.user = { userId };
    return true;
  }

  override handleRequest<T = Principal>(error: unknown, user: T | false): T {
    if (error instanceof Error) throw error;
    if (!user) throw unauthorised();
    return user;
  }
}
