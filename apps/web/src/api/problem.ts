/** An RFC 9457 problem as the API sends it, thrown by every call that fails. */
export interface ProblemDetails {
  title: string;
  status: number;
  detail?: string;
  errors?: { path: string; detail: string }[];
}

export class Problem extends Error {
  constructor(
    readonly details: ProblemDetails,
    /** The whole answer, for problems that carry more, such as both versions of a lost race. */
    readonly body: unknown = details,
  ) {
    super(details.detail ?? details.title);
    this.name = 'Problem';
  }

  get status(): number {
    return this.details.status;
  }

  /** First message for each field path, `nuclei[1].shift`. */
  get fields(): Record<string, string> {
    const fields: Record<string, string> = {};
    for (const { path, detail } of this.details.errors ?? []) fields[path] ??= detail;
    return fields;
  }
}

/** The problem in an answer that is not a success; an answer without problem details gets a sentence by its status. */
export function toProblem(body: unknown, status: number): Problem {
  if (typeof body === 'object' && body !== null && 'title' in body && typeof body.title === 'string') {
    return new Problem({ ...(body as ProblemDetails), status }, body);
  }
  return new Problem(
    { title: status >= 500 ? 'The server could not answer. Try again in a moment.' : `Refused (${status}).`, status },
    body,
  );
}

/** What to tell about anything that was thrown. */
export function messageOf(error: unknown): string {
  if (error instanceof Problem) return error.message;
  if (error instanceof TypeError && /fetch|network|load failed/i.test(error.message))
    return 'The server cannot be reached. Check the connection and try again.';
  return error instanceof Error ? error.message : String(error);
}
