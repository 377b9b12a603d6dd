/**
 * Ordinate tables `(X++(Y..Y))` of JCAMP-DX: a line is the abscissa of its first ordinate, then ordinates.
 *   SQZ  first digit and sign in one letter   @ A..I, a..i     the ordinate itself
 *   DIF  the same for a difference            % J..R, j..r     to the ordinate before
 *   DUP  how often the token before stands    S..Z, s          itself included
 * A line that ends in a difference is followed by one that repeats the ordinate: the Y check.
 * Source: R. S. McDonald, P. A. Wilks, Appl. Spectrosc. 42 (1988) 151; A. N. Davies, P. Lampen, ibid. 47 (1993) 1093.
 */

/** A table that can't be read without guessing. */
export class TableError extends Error {
  constructor(message: string) {
    super(message);
    this.name = 'TableError';
  }
}

const LINE_LENGTH = 80;
/** More ordinates than this are refused, so that a short text can't ask for all memory by a repeat count. */
const MOST_ORDINATES = 2 ** 23;

const SQUEEZED = '@ABCDEFGHI';
const SQUEEZED_NEGATIVE = '@abcdefghi';
const DIFFERENCE = '%JKLMNOPQR';
const DIFFERENCE_NEGATIVE = '%jklmnopqr';
const REPEAT = ' STUVWXYZs';

/**
 * Writes integers as the lines of a table in the DIFDUP form, at most 80 characters each, closed by its check line.
 * `abscissa(i)` is the label of ordinate i, written as it stands in front of a line.
 */
export function encodeDifdup(values: Int32Array, abscissa: (index: number) => string): string[] {
  const lines: string[] = [];
  let line = abscissa(0) + token(values[0], SQUEEZED, SQUEEZED_NEGATIVE);
  for (let i = 1; i < values.length;) {
    const difference = values[i] - values[i - 1];
    let run = 1;
    while (run < 9 && i + run < values.length && values[i + run] - values[i + run - 1] === difference) run++;
    const written = token(difference, DIFFERENCE, DIFFERENCE_NEGATIVE) + (run > 1 ? REPEAT[run] : '');
    if (line.length + written.length > LINE_LENGTH) {
      lines.push(line);
      line = abscissa(i - 1) + token(values[i - 1], SQUEEZED, SQUEEZED_NEGATIVE);
    }
    line += written;
    i += run;
  }
  lines.push(line);
  const last = values.length - 1;
  if (last > 0) lines.push(abscissa(last) + token(values[last], SQUEEZED, SQUEEZED_NEGATIVE));
  return lines;
}

function token(value: number, positive: string, negative: string): string {
  const digits = String(Math.abs(value));
  return (value < 0 ? negative : positive)[Number(digits[0])] + digits.slice(1);
}

export interface DecodedTable {
  values: Float64Array;
  /** Abscissa and index of the first ordinate of each line, for the X check. */
  labels: { value: number; index: number }[];
}

const TOKEN = /[\s,;]*(?:([+-]?(?:\d+\.?\d*|\.\d+)(?:[Ee][+-]\d{2,3})?)|([@A-Ia-i%J-Rj-rS-Zs])(\d*)|(\S))/y;

/**
 * Reads a table in any of the forms AFFN, PAC, SQZ, DIF and DUP. Throws TableError for a missing ordinate ('?'), a
 * sign that is no number, a Y check that fails and a repeat count beyond all measure.
 */
export function decodeTable(table: string): DecodedTable {
  const decoder = new Decoder();
  table
    .replace(/\$\$.*$/gm, '')
    .split(/\r\n|\r|\n/)
    .forEach((line, number) => decoder.line(line.trim(), number + 1));
  return { values: Float64Array.from(decoder.values), labels: decoder.labels };
}

class Decoder {
  readonly values: number[] = [];
  readonly labels: DecodedTable['labels'] = [];
  /** The line before ended in a difference, so the next ordinate repeats the last one. */
  private check = false;
  private difference: number | null = null;
  private number = 0;

  line(text: string, number: number): void {
    if (text === '') return;
    this.number = number;
    TOKEN.lastIndex = 0;
    const label = TOKEN.exec(text)?.[1];
    if (label === undefined) throw this.error(`starts with '${text[0]}' where an abscissa belongs`);
    this.labels.push({ value: Number(label), index: this.check ? this.values.length - 1 : this.values.length });
    while (TOKEN.lastIndex < text.length) {
      const [, plain, letter, digits, other] = TOKEN.exec(text) ?? [];
      if (plain !== undefined) this.ordinate(Number(plain));
      else if (letter !== undefined) this.letter(letter, digits);
      else if (other === '?') throw this.error(`has a missing ordinate, '?'`);
      else throw this.error(`has '${other}', which is no ordinate`);
    }
    this.check = this.difference !== null;
    this.difference = null;
  }

  private letter(letter: string, digits: string): void {
    const value = (at: number) => Number(`${at}${digits}`);
    if (SQUEEZED.includes(letter)) this.ordinate(value(SQUEEZED.indexOf(letter)));
    else if (SQUEEZED_NEGATIVE.includes(letter)) this.ordinate(-value(SQUEEZED_NEGATIVE.indexOf(letter)));
    else if (DIFFERENCE.includes(letter)) this.step(value(DIFFERENCE.indexOf(letter)));
    else if (DIFFERENCE_NEGATIVE.includes(letter)) this.step(-value(DIFFERENCE_NEGATIVE.indexOf(letter)));
    else this.repeat(value(REPEAT.indexOf(letter)));
  }

  private ordinate(value: number): void {
    this.difference = null;
    if (!this.check) {
      this.values.push(value);
      return;
    }
    this.check = false;
    const last = this.values[this.values.length - 1];
    if (value !== last) throw this.error(`repeats ${value} where the line before ended with ${last}`);
  }

  private step(difference: number): void {
    if (this.check || this.values.length === 0) throw this.error('starts with a difference');
    this.difference = difference;
    this.values.push(this.values[this.values.length - 1] + difference);
  }

  private repeat(count: number): void {
    if (this.values.length === 0) throw this.error('starts with a repeat count');
    if (this.values.length + count > MOST_ORDINATES) throw this.error(`asks for ${count} equal ordinates`);
    for (let i = 1; i < count; i++) this.values.push(this.values[this.values.length - 1] + (this.difference ?? 0));
  }

  private error(what: string): TableError {
    return new TableError(`line ${this.number} of the table ${what}`);
  }
}
