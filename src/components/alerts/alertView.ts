/** The view of the alerts table as the address bar carries it: a copied link shows the same table. */
import { alertQuery, type AlertQuery } from '../../contracts/alerts.ts';

const DEFAULTS = alertQuery.parse({});

/** The query of an address; what cannot be used falls back to the default view and is said by the page. */
export function readAlertView(search: URLSearchParams): { query: AlertQuery; understood: boolean } {
  const parsed = alertQuery.safeParse(Object.fromEntries(search));
  return parsed.success ? { query: parsed.data, understood: true } : { query: DEFAULTS, understood: false };
}

/** Only what differs from the default view, in a fixed order. */
export function alertSearch(query: AlertQuery): string {
  const search = new URLSearchParams();
  for (const key of Object.keys(alertQuery.shape) as (keyof AlertQuery)[]) {
    const value = query[key];
    if (value !== undefined && value !== DEFAULTS[key]) search.set(key, String(value));
  }
  const text = search.toString();
  return text === '' ? '' : `?${text}`;
}

/** A change of filter or order starts at the first page again. */
export const withChange = (query: AlertQuery, change: Partial<AlertQuery>): AlertQuery => ({
  ...query,
  page: 1,
  ...change,
});
