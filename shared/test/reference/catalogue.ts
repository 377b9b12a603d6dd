import { readFileSync } from 'node:fs';

/** One case of the catalogue of published results: numbers computed independently from the formula that is cited. */
export interface ReferenceCase<Inputs, Expected> {
  readonly id: string;
  readonly title: string;
  readonly citation: string;
  /** How formula and numbers were confirmed. */
  readonly confirmed: string;
  readonly formula: string;
  readonly inputs: Inputs;
  readonly expected: Expected;
  /** `rel` or `abs` for every number of the case, or a bound by the name of the number. */
  readonly tolerance: Readonly<Record<string, number>>;
}

/** The cases of one topic of the catalogue whose id starts with `prefix`, like 'F03'. Throws if there are none. */
export function referenceCases<Inputs, Expected>(prefix: string): ReferenceCase<Inputs, Expected>[] {
  const file = new URL(`./topic-${prefix[0].toLowerCase()}.json`, import.meta.url);
  const cases = JSON.parse(readFileSync(file, 'utf8')) as ReferenceCase<Inputs, Expected>[];
  const found = cases.filter(({ id }) => id.startsWith(prefix));
  if (found.length === 0) throw new RangeError(`The catalogue has no case ${prefix}`);
  return found;
}
