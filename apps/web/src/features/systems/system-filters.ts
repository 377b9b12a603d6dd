import type { SystemFilters } from '../../api/queries';

/** Parameters of the page's address. */
export const SYSTEM_FILTERS = ['q', 'nuclide', 'owner', 'shared', 'archived', 'sort'] as const;
export type SystemFilterName = (typeof SYSTEM_FILTERS)[number];

/** What the API is asked for, from the parameters in the address. Archived systems show only when asked for. */
export function toQuery({
  q,
  nuclide,
  owner,
  shared,
  archived,
}: Partial<Record<SystemFilterName, string>>): SystemFilters {
  return {
    ...(q && { q }),
    ...(nuclide && { nuclide }),
    ...(owner && { owner }),
    ...(shared && { shared: shared === 'yes' }),
    archived: archived === 'yes',
  };
}
