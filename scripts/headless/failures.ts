import { DocumentRefused, EngineError } from '@heddle/shared';

/** An option of the command line that is refused. */
export class OptionRefused extends Error {}

/** Documents that are refused, with every field that is wrong in either of them. */
export class PairRefused extends Error {
  constructor(readonly parts: readonly DocumentRefused[]) {
    super('the documents are refused');
  }
}

/** What went wrong as lines for standard error and the exit code of the command. */
export interface Failure {
  lines: string[];
  exitCode: 1 | 2;
}

export function describeFailure(error: unknown): Failure {
  if (error instanceof PairRefused) return { lines: error.parts.flatMap(fieldLines), exitCode: 2 };
  if (error instanceof DocumentRefused) return { lines: fieldLines(error), exitCode: 2 };
  if (error instanceof OptionRefused) return { lines: [error.message], exitCode: 2 };
  if (error instanceof EngineError) {
    const refused = error.code === 'TOO_LARGE' || error.code === 'UNSUPPORTED';
    return { lines: [error.message], exitCode: refused ? 2 : 1 };
  }
  return { lines: [error instanceof Error ? error.message : String(error)], exitCode: 1 };
}

export function reportFailure(error: unknown): 1 | 2 {
  const { lines, exitCode } = describeFailure(error);
  process.stderr.write(lines.map((line) => `${line}\n`).join(''));
  return exitCode;
}

function fieldLines({ document, errors }: DocumentRefused): string[] {
  return errors.map(({ path, message }) => `${path || document}: ${message.replace(/\s+/g, ' ')}`);
}
