/** Shortest password, in characters: what NIST SP 800-63B-4 asks of one that stands alone. The server decides. */
const SHORTEST = 15;

export const PASSWORD_HINT = `At least ${SHORTEST} characters; a few unrelated words are easy to keep and hard to guess.`;

export function checkPassword(password: string): string | null {
  return [...password].length < SHORTEST ? `At least ${SHORTEST} characters` : null;
}
