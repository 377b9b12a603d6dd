import { useSearchParams } from 'react-router-dom';

/**
 * Filters of a list, kept in the address so that they can be shared and come back with the back button. An empty value
 * takes its parameter out.
 */
export function useSearchFilters<Name extends string>(names: readonly Name[]) {
  const [search, setSearch] = useSearchParams();
  const filters = Object.fromEntries(
    names.flatMap((name) => (search.get(name) ? [[name, search.get(name)]] : [])),
  ) as Partial<Record<Name, string>>;
  const set = (name: Name, value: string | null) =>
    setSearch(
      (before) => {
        const after = new URLSearchParams(before);
        if (value) after.set(name, value);
        else after.delete(name);
        return after;
      },
      { replace: true, preventScrollReset: true },
    );
  const clear = () => setSearch({}, { replace: true, preventScrollReset: true });
  return { filters, set, clear, any: Object.keys(filters).length > 0 };
}
