import { createHash, randomBytes } from 'node:crypto';

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

export function isUuid(text: string): boolean {
  return UUID.test(text);
}

/** A secret nobody can guess, 256 random bits. */
export function newSecret(): string {
  return randomBytes(32).toString('base64url');
}

/** What of a secret is kept: its SHA-256 in hexadecimal. */
export function hashOf(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}
