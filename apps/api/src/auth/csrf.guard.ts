import { timingSafeEqual } from 'node:crypto';
import { Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import { forbidden } from '../common/problem.js';
import { ACCESS_COOKIE, cookieOf, CSRF_COOKIE, CSRF_HEADER, REFRESH_COOKIE } from './cookies.js';
import type { Request } from 'express';

const SAFE = ['GET', 'HEAD', 'OPTIONS'];

/**
 * Double-submit check: an unsafe call that carries the session's cookies must repeat the readable cookie in a header,
 * which a page of another origin can't read. Calls with a personal token carry no cookie and need none.
 */
@Injectable()
export class CsrfGuard implements CanActivate {
  canActivate(context: ExecutionContext): boolean {
    const request = context.switchToHttp().getRequest<Request>();
    if (SAFE.includes(request.method) || request.headers.authorization !== undefined) return true;
    if (!cookieOf(request, ACCESS_COOKIE) && !cookieOf(request, REFRESH_COOKIE)) return true;
    const expected = Buffer.from(cookieOf(request, CSRF_COOKIE) ?? '');
    const given = Buffer.from(request.header(CSRF_HEADER) ?? '');
    const equal = expected.length > 0 && expected.length === given.length && timingSafeEqual(expected, given);
    if (!equal) throw forbidden(`The call lacks the ${CSRF_HEADER} header that matches its cookie.`);
    return true;
  }
}
