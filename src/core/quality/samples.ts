import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import { toSample } from '../money/toSample.ts';
import { balanceAt, lastTwelveMonths, quarterFlow, type Presence } from '../statements/flows.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import type { InputUsed, Reading } from '../statements/reading.ts';
import type { StatementBook } from '../statements/statementBook.ts';

type Find = (book: StatementBook, line: LineItemCode, date: PlainDate, presence: Presence) => Reading;

const ROUTES = {
  'twelve months': [lastTwelveMonths, 'required'],
  'twelve months, optional': [lastTwelveMonths, 'optional'],
  quarter: [quarterFlow, 'required'],
  'quarter, optional': [quarterFlow, 'optional'],
  balance: [balanceAt, 'required'],
  'balance, optional': [balanceAt, 'optional'],
} as const satisfies Record<string, readonly [Find, Presence]>;
export type Route = keyof typeof ROUTES;

export interface Sample {
  readonly value: number;
  readonly inputs: readonly InputUsed[];
}

type Samples = (route: Route, line: LineItemCode, date: PlainDate) => Sample | null;

const KNOWN = new WeakMap<StatementBook, Samples>();

/**
 * The figures of a book as points of a sample; null where a figure is missing or has no meaning. A book never changes
 * and eight quarter ends ask for the same figures over and over, so what was read is kept as long as the book is.
 *
 * @example samplesOf(book)('twelve months', 'revenue', '2026-09-30')?.value // => 90000000
 */
export function samplesOf(book: StatementBook): Samples {
  const known = KNOWN.get(book);
  if (known) return known;
  const samples = readOnce(book);
  KNOWN.set(book, samples);
  return samples;
}

function readOnce(book: StatementBook): Samples {
  const byRoute = new Map<Route, Map<LineItemCode, Map<PlainDate, Sample | null>>>();
  return (route, line, date) => {
    const byDate = within(within(byRoute, route), line);
    const known = byDate.get(date);
    if (known !== undefined) return known;
    const [find, presence] = ROUTES[route];
    const reading = find(book, line, date, presence);
    const sample = reading.kind === 'value' ? sampleOf(reading.value, reading.inputs) : null;
    byDate.set(date, sample);
    return sample;
  };
}

const sampleOf = (value: Decimal, inputs: readonly InputUsed[]): Sample => ({
  value: toSample(value),
  inputs,
});

/** The inner map under the key, made on first sight. */
function within<Key, Inner, Value>(map: Map<Key, Map<Inner, Value>>, key: Key): Map<Inner, Value> {
  const known = map.get(key);
  if (known) return known;
  const made = new Map<Inner, Value>();
  map.set(key, made);
  return made;
}
