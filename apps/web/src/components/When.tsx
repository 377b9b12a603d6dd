import { formatDateTime, formatWhen } from '../lib/format';

/** A moment, in words that suit its distance; the exact one on hover. */
export function When({ iso }: { iso: string }) {
  return (
    <time dateTime={iso} title={formatDateTime(iso)}>
      {formatWhen(iso)}
    </time>
  );
}
