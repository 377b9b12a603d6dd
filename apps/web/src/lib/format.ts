const RELATIVE = new Intl.RelativeTimeFormat('en', { numeric: 'auto' });
const DATE = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });
const DATE_TIME = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short' });

const STEPS: readonly [Intl.RelativeTimeFormatUnit, seconds: number][] = [
  ['day', 86_400],
  ['hour', 3_600],
  ['minute', 60],
];

/** '3 hours ago' within a week, else the date. */
export function formatWhen(iso: string, now = Date.now()): string {
  const seconds = (Date.parse(iso) - now) / 1000;
  if (Math.abs(seconds) > 7 * 86_400) return DATE.format(Date.parse(iso));
  for (const [unit, size] of STEPS) {
    if (Math.abs(seconds) >= size) return RELATIVE.format(Math.round(seconds / size), unit);
  }
  return 'just now';
}

export function formatDateTime(iso: string): string {
  return DATE_TIME.format(Date.parse(iso));
}

/** A duration in the unit that suits it: 340 ms, 2.4 s, 3 min 20 s. */
export function formatSeconds(seconds: number): string {
  if (seconds < 1) return `${Math.round(seconds * 1000)} ms`;
  if (seconds < 60) return `${seconds.toPrecision(2)} s`;
  return `${Math.floor(seconds / 60)} min ${Math.round(seconds % 60)} s`;
}
