import createClient from 'openapi-fetch';
import { toProblem } from './problem';
import type { paths } from './schema';
import { sessionFetch } from './session-fetch';

/** The typed client. `schema.d.ts` is generated from the API's OpenAPI document by `npm run generate`. */
export const client = createClient<paths>({ baseUrl: location.origin, fetch: sessionFetch });

/** The data of an answer; throws a `Problem` for any other answer. */
export async function unwrap<T>(call: Promise<{ data?: T; error?: unknown; response: Response }>): Promise<T> {
  const { data, error, response } = await call;
  if (!response.ok) throw toProblem(error, response.status);
  return data as T;
}
