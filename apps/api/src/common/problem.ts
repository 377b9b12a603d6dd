import { HttpException, HttpStatus } from '@nestjs/common';
import type { DocumentError } from '@heddle/shared';

/** One field that was refused: `path` as in documents, `nuclei[1].shift`; `pointer` the same as a JSON pointer (RFC 6901). */
export interface FieldProblem {
  path: string;
  pointer: string;
  detail: string;
}

/** Problem details for HTTP (RFC 9457). */
export interface ProblemDetails {
  type: string;
  title: string;
  status: number;
  detail: string;
  instance?: string;
  errors?: FieldProblem[];
  [extension: string]: unknown;
}

/** A refusal with a kind of its own; `extensions` are members beside the standard ones. */
export class Problem extends HttpException {
  constructor(
    status: HttpStatus,
    readonly kind: string,
    detail: string,
    readonly extensions: { errors?: FieldProblem[]; [name: string]: unknown } = {},
  ) {
    super(detail, status);
  }
}

export const notFound = (what: string) => new Problem(HttpStatus.NOT_FOUND, 'not-found', `There is no such ${what}.`);

export const forbidden = (detail: string) => new Problem(HttpStatus.FORBIDDEN, 'forbidden', detail);

/** A lost race: somebody saved since. Carries both versions, so that nothing is lost. */
export const conflict = (detail: string, current: unknown, yours: unknown) =>
  new Problem(HttpStatus.CONFLICT, 'conflict', detail, { current, yours });

/** Fields that are refused, by their paths in the body, or in `document` where it is one of the three documents. */
export function refusedFields(errors: readonly DocumentError[], document?: string): Problem {
  const fields = errors.map(({ path, message }) => fieldProblem(path, message));
  const detail =
    fields.length === 1 ? `${fields[0].path}: ${fields[0].detail}` : `${fields.length} fields are refused.`;
  return new Problem(HttpStatus.UNPROCESSABLE_ENTITY, 'invalid', detail, {
    ...(document && { document }),
    errors: fields,
  });
}

export function fieldProblem(path: string, detail: string): FieldProblem {
  const pointer = `#/${path
    .replace(/\[(\d+)\]/g, '.$1')
    .replace(/^\./, '')
    .split('.')
    .join('/')}`;
  return { path, pointer: path === '' ? '#' : pointer, detail };
}
