/** The pages that the navigation of a laboratory offers, in its order. */
export const LAB_PAGES = [
  { path: 'today', label: 'Today' },
  { path: 'systems', label: 'Systems' },
  { path: 'runs', label: 'Runs' },
  { path: 'series', label: 'Series' },
  { path: 'members', label: 'Lab' },
] as const;
