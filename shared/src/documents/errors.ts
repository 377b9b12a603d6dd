/** One broken rule of a document. `path` names the field, zero-based, like `nuclei[1].shift`; '' is the document itself. */
export interface DocumentError {
  readonly path: string;
  readonly message: string;
}

/** A document, or a pair of documents, that was refused. Holds every rule that was found broken, never an empty list. */
export class DocumentRefused extends Error {
  constructor(
    readonly document: 'system' | 'experiment',
    readonly errors: readonly DocumentError[],
  ) {
    super(errors.map((error) => `${error.path}: ${error.message}`).join('\n'));
    this.name = 'DocumentRefused';
  }
}

/** Writes a path of keys and indices the way users see it: ['nuclei', 1, 'shift'] is `nuclei[1].shift`. */
export function formatPath(keys: readonly PropertyKey[]): string {
  let path = '';
  for (const key of keys) {
    if (typeof key === 'number') path += `[${key}]`;
    else if (/^[A-Za-z_][\w]*$/.test(String(key))) path += path === '' ? String(key) : `.${String(key)}`;
    else path += `["${String(key)}"]`;
  }
  return path;
}
