const BROWSERS = [
  ['Edg/', 'Edge'],
  ['Firefox/', 'Firefox'],
  ['Chrome/', 'Chrome'],
  ['Safari/', 'Safari'],
] as const;
const SYSTEMS = [
  ['Android', 'Android'],
  ['iPhone', 'iPhone'],
  ['iPad', 'iPad'],
  ['Windows', 'Windows'],
  ['Mac OS X', 'macOS'],
  ['Linux', 'Linux'],
] as const;

/** A user agent in words one recognises, as far as it tells: 'Firefox on Linux'. The order of the tables matters. */
export function describeBrowser(userAgent: string): string {
  const browser = BROWSERS.find(([mark]) => userAgent.includes(mark))?.[1];
  const system = SYSTEMS.find(([mark]) => userAgent.includes(mark))?.[1];
  if (!browser) return userAgent.slice(0, 60) || 'Unknown';
  return system ? `${browser} on ${system}` : browser;
}
