import { once } from 'node:events';
import { createWriteStream } from 'node:fs';
import { toCsv, toJcamp, type Result } from '@heddle/shared';

/** The forms a result is written in, and the ending of each. */
export const FORMS = ['json', 'jcamp', 'csv'] as const;
export type Form = (typeof FORMS)[number];
export const ENDINGS: Record<Form, string> = { json: '.json', jcamp: '.jdx', csv: '.csv' };

export function isForm(name: string): name is Form {
  return (FORMS as readonly string[]).includes(name);
}

/** Writes to a file, or to standard output without one, without holding the whole text in memory. */
export async function writeResult(result: Result, form: Form, file?: string): Promise<void> {
  const stream = file === undefined ? process.stdout : createWriteStream(file);
  if (file !== undefined) await once(stream, 'open');
  for (const piece of pieces(result, form)) {
    if (!stream.write(piece)) await once(stream, 'drain');
  }
  if (file !== undefined) await new Promise<void>((done, failed) => stream.on('error', failed).end(done));
}

function* pieces(result: Result, form: Form): Generator<string> {
  if (form === 'jcamp') yield toJcamp(result);
  else if (form === 'csv') yield toCsv(result);
  else {
    yield* jsonPieces(result);
    yield '\n';
  }
}

/** Numbers joined at a time. */
const PIECE = 8192;

/** JSON of a tree of plain values and Float64Arrays; the arrays come out in pieces. */
export function* jsonPieces(value: unknown): Generator<string> {
  if (value instanceof Float64Array) {
    yield '[';
    for (let i = 0; i < value.length; i += PIECE) yield (i > 0 ? ',' : '') + value.subarray(i, i + PIECE).join(',');
    yield ']';
  } else if (typeof value === 'object' && value !== null && !Array.isArray(value)) {
    yield '{';
    let separator = '';
    for (const [key, field] of Object.entries(value)) {
      if (field === undefined) continue;
      yield `${separator}${JSON.stringify(key)}:`;
      yield* jsonPieces(field);
      separator = ',';
    }
    yield '}';
  } else yield JSON.stringify(value);
}
