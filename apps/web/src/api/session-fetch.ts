/**
 * `fetch` for calls that carry the session's cookies: sends the CSRF token with unsafe methods, and when the access token
 * has run out renews it once and repeats the call. Renewals are serialised, in this tab by one shared promise and between
 * tabs by a lock, because the refresh token rotates and a voided one that is used again ends the session.
 */
const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);
/** Calls whose 401 speaks of what was typed, or of the refresh token itself. */
const NOT_RENEWED = ['/api/auth/sign-in', '/api/auth/refresh', '/api/auth/sign-out'];

let renewal: Promise<boolean> | undefined;
const signedOut = new Set<() => void>();

/** Calls `listener` whenever the session turns out to be over. Returns the way to stop. */
export function onSignedOut(listener: () => void): () => void {
  signedOut.add(listener);
  return () => signedOut.delete(listener);
}

export function csrfToken(): string {
  const cookie = document.cookie.split('; ').find((entry) => entry.startsWith('heddle_csrf='));
  return cookie ? decodeURIComponent(cookie.slice('heddle_csrf='.length)) : '';
}

function send(request: Request): Promise<Response> {
  if (!SAFE.has(request.method)) request.headers.set('x-csrf-token', csrfToken());
  return fetch(request);
}

async function renew(): Promise<boolean> {
  const call = async () =>
    (await send(new Request(new URL('/api/auth/refresh', location.origin), { method: 'POST' }))).ok;
  // `locks` is missing on plain http origins other than localhost.
  return 'locks' in navigator ? navigator.locks.request('heddle-renew', call) : call();
}

/** Renews the access token; false when the session is over. Calls made meanwhile share one renewal. */
export function renewSession(): Promise<boolean> {
  renewal ??= renew().finally(() => (renewal = undefined));
  return renewal;
}

export async function sessionFetch(request: Request): Promise<Response> {
  const again = request.clone();
  const response = await send(request);
  if (response.status !== 401 || NOT_RENEWED.includes(new URL(request.url).pathname)) return response;
  if (await renewSession()) return send(again);
  for (const listener of signedOut) listener();
  return response;
}
