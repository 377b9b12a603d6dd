import type { SpinSystem, Varied } from '@heddle/shared';

/** The quantities in words. */
export const QUANTITY_WORDS: Record<Varied, string> = {
  field: '1H frequency',
  temperature: 'temperature',
  spinning: 'spinning rate',
  delay: 'delay',
  rate: 'exchange rate',
  coupling: 'coupling',
  tauC: 'correlation time',
};

/** What of a kind can be varied in a system: the exchange steps or couplings, as 'a,b'. */
export function targetsOf(system: SpinSystem, quantity: Varied): string[] {
  if (quantity === 'rate') return (system.exchange ?? []).map(({ from, to }) => `${from},${to}`);
  if (quantity === 'coupling') return system.couplings.map(({ between }) => between.join(','));
  return [];
}

/** Values as they are typed: numbers apart by blanks or commas; null where one is no number. */
export function readValues(text: string): number[] | null {
  const parts = text.split(/[\s,;]+/).filter((part) => part !== '');
  const values = parts.map(Number);
  return values.some((value) => !Number.isFinite(value)) ? null : values;
}
