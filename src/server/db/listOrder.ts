/** How lists are sorted and paged: by keys from a fixed table, never from a request. */

export interface ListOrder<Sort extends string> {
  readonly sort: Sort;
  readonly direction: 'up' | 'down';
}

export interface ListPage {
  readonly page: number;
  readonly perPage: number;
}

/** What has no value stands last in both directions; `tie` keeps the pages apart where keys are equal. */
export function orderBy<Sort extends string>(
  keys: Readonly<Record<Sort, readonly string[]>>,
  { sort, direction }: ListOrder<Sort>,
  tie: string,
): string {
  const way = direction === 'up' ? 'asc' : 'desc';
  return `order by ${[...keys[sort].map((key) => `${key} is null, ${key} ${way}`), tie].join(', ')}`;
}

export const pageOf = ({ page, perPage }: ListPage): string =>
  `limit ${Math.trunc(perPage)} offset ${Math.trunc((page - 1) * perPage)}`;
