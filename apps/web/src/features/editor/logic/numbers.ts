export type ReadNumber = { ok: true; value: number } | { ok: false; message: string };

const DECIMAL = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
/** One comma and digits around it: '1,5' is a decimal in many places and a thousand in others. */
const COMMA = /^[+-]?\d+(\.\d{3})*,\d+$/;

/** Reads a number as typed. Nothing is guessed: a decimal comma is refused with the way to write it. */
export function readNumber(text: string): ReadNumber {
  const plain = text.trim().replace(/^[\u2212\u2013]/, '-');
  if (DECIMAL.test(plain)) {
    const value = Number(plain);
    return Number.isFinite(value) ? { ok: true, value } : { ok: false, message: `'${text.trim()}' is too large` };
  }
  if (COMMA.test(plain)) {
    return {
      ok: false,
      message: `write '${text.trim()}' with a decimal point: ${plain.replaceAll('.', '').replace(',', '.')}`,
    };
  }
  return { ok: false, message: `'${text.trim()}' is not a number` };
}

/** A number as it is shown in a cell: shortest form that reads back to the same number. */
export function writeNumber(value: number): string {
  return String(value);
}

function decimals(text: string): number {
  const match = /\.(\d+)/.exec(text);
  return match ? match[1].length : 0;
}

/**
 * The text after one step up or down. Keeps the decimals that were typed, or those of the step when it has more;
 * text that is no number is left alone, a blank starts from zero.
 */
export function stepNumber(text: string, step: number): string {
  const read = text.trim() === '' ? { ok: true as const, value: 0 } : readNumber(text);
  if (!read.ok) return text;
  const places = Math.max(decimals(text), decimals(String(Math.abs(step))));
  const next = (read.value + step).toFixed(places);
  return Number(next) === 0 ? (0).toFixed(places) : next;
}
