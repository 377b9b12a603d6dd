import { createParamDecorator, SetMetadata, type ExecutionContext } from '@nestjs/common';
import type { Request } from 'express';

/** Who sends a request, and by which means. */
export interface Principal {
  readonly userId: string;
  /** The session of a browser; undefined for a personal token. */
  readonly sessionId?: string;
}

export type AuthenticatedRequest = Request & { user: Principal };

export const PUBLIC = 'heddle:public';

/** A route that needs no session. */
export const Public = () => SetMetadata(PUBLIC, true);

/** The Principal of the request. */
export const Asker = createParamDecorator(
  (_: unknown, context: ExecutionContext): Principal => context.switchToHttp().getRequest<AuthenticatedRequest>().user,
);
