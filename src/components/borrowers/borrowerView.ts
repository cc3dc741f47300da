/** The view of the borrowers table as the address bar carries it. */
import { borrowerQuery, type BorrowerQuery } from '../../contracts/borrowers.ts';

const DEFAULTS = borrowerQuery.parse({});

export function readBorrowerView(search: URLSearchParams): { query: BorrowerQuery; understood: boolean } {
  const parsed = borrowerQuery.safeParse(Object.fromEntries(search));
  return parsed.success ? { query: parsed.data, understood: true } : { query: DEFAULTS, understood: false };
}

/** Only what differs from the default view, in a fixed order. */
export function borrowerSearch(query: BorrowerQuery): string {
  const search = new URLSearchParams();
  for (const key of Object.keys(borrowerQuery.shape) as (keyof BorrowerQuery)[]) {
    const value = query[key];
    if (value !== undefined && value !== '' && value !== DEFAULTS[key]) search.set(key, String(value));
  }
  const text = search.toString();
  return text === '' ? '' : `?${text}`;
}
