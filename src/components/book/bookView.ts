import { bookQuery, type BookQuery } from '../../contracts/book.ts';

/** What the page shows: a part of the book, and the width of the chart's intervals in hundredths of the level. */
export interface BookLook {
  readonly query: BookQuery;
  readonly width: ChartWidth;
}

export const CHART_WIDTHS = ['2', '1', '3'] as const;
export type ChartWidth = (typeof CHART_WIDTHS)[number];

const isChartWidth = (text: string): text is ChartWidth => (CHART_WIDTHS as readonly string[]).includes(text);

/** The address as a view; what it does not understand it leaves out, and says so. */
export function readBookLook(search: URLSearchParams): BookLook & { readonly understood: boolean } {
  const { width: asked, ...rest } = Object.fromEntries(search);
  const parsed = bookQuery.safeParse(rest);
  const width = asked !== undefined && isChartWidth(asked) ? asked : CHART_WIDTHS[0];
  return {
    query: parsed.success ? parsed.data : {},
    width,
    understood: parsed.success && (asked === undefined || asked === width),
  };
}

/** What the address and the request carry; the usual view carries nothing. */
export function bookSearch({ query, width }: BookLook): string {
  const search = new URLSearchParams();
  for (const [key, value] of Object.entries(query)) if (value !== undefined) search.set(key, value);
  if (width !== CHART_WIDTHS[0]) search.set('width', width);
  const text = search.toString();
  return text === '' ? '' : `?${text}`;
}
