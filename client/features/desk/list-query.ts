import { useCallback } from 'react';
import { useSearchParams } from 'react-router-dom';

type Values = Record<string, string>;

/** The list's filter as it stands in the address, and the way to change it. */
export function useListQuery(): {
  value: (name: string) => string;
  page: number;
  /** Empty values leave the address; any change but of the page itself goes back to the first page. */
  change: (values: Values) => void;
  linkTo: (values: Values) => string;
} {
  const [query, setQuery] = useSearchParams();
  const changed = useCallback(
    (values: Values) => {
      const next = new URLSearchParams(query);
      if (!('page' in values)) next.delete('page');
      for (const [name, value] of Object.entries(values)) {
        if (value === '') next.delete(name);
        else next.set(name, value);
      }
      return next;
    },
    [query],
  );
  const change = useCallback(
    (values: Values) => setQuery(changed(values), { replace: true, preventScrollReset: true }),
    [setQuery, changed],
  );
  const page = Math.trunc(Number(query.get('page') ?? 1)) || 1;
  return {
    value: (name) => query.get(name) ?? '',
    page: Math.min(100_000, Math.max(1, page)),
    change,
    linkTo: (values) => `?${changed(values).toString()}`,
  };
}
