import type { Request, Response } from 'express';
import { newSecret } from '../common/ids.js';

export const ACCESS_COOKIE = 'heddle_access';
export const REFRESH_COOKIE = 'heddle_refresh';
/** Readable by the client, which sends it back in the header. */
export const CSRF_COOKIE = 'heddle_csrf';
export const CSRF_HEADER = 'x-csrf-token';

export const ACCESS_SECONDS = 15 * 60;
export const REFRESH_SECONDS = 30 * 24 * 3600;

const REFRESH_PATH = '/api/auth';

export interface SessionTokens {
  access: string;
  refresh: string;
}

/** `secure` marks the cookies for https only. */
export function setSessionCookies(response: Response, { access, refresh }: SessionTokens, secure: boolean): void {
  const common = { sameSite: 'strict', secure } as const;
  response.cookie(ACCESS_COOKIE, access, { ...common, httpOnly: true, path: '/', maxAge: ACCESS_SECONDS * 1000 });
  response.cookie(REFRESH_COOKIE, refresh, {
    ...common,
    httpOnly: true,
    path: REFRESH_PATH,
    maxAge: REFRESH_SECONDS * 1000,
  });
  response.cookie(CSRF_COOKIE, newSecret(), { ...common, path: '/', maxAge: REFRESH_SECONDS * 1000 });
}

export function clearSessionCookies(response: Response): void {
  response.clearCookie(ACCESS_COOKIE, { path: '/' });
  response.clearCookie(REFRESH_COOKIE, { path: REFRESH_PATH });
  response.clearCookie(CSRF_COOKIE, { path: '/' });
}

/** A cookie of the request; undefined where it sent none of that name. */
export function cookieOf(request: Request, name: string): string | undefined {
  return (request.cookies as Record<string, string | undefined> | undefined)?.[name];
}
