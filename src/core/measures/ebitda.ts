/** EBITDA, built from the bottom of the income statement and held against the way down from revenue. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import { formatMoneyInFull } from '../money/print.ts';
import { lastTwelveMonths, type Presence } from '../statements/flows.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { bridgeFigure, bridgeSubtotal, type BridgeLine } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import { flowIn } from './readLines.ts';

/** Amounts of one period, costs positive. */
export interface EarningsFromBottom {
  readonly netIncome: Decimal;
  readonly incomeTax: Decimal;
  readonly netFinanceCosts: Decimal;
  readonly depreciationAndAmortisation: Decimal;
}

/**
 * EBITDA up from net income: net income + income tax + net finance costs + depreciation and amortisation.
 *
 * All in one currency unit. Impairment is added only where the agreement says so. Source: methods.md A3.
 *
 * @example ebitdaFromNetIncome({ netIncome: decimal('4.2'), incomeTax: decimal('1.6'), netFinanceCosts: decimal('2.5'), depreciationAndAmortisation: decimal('3.7') }) // => 12
 */
export const ebitdaFromNetIncome = (earnings: EarningsFromBottom): Decimal =>
  earnings.netIncome
    .plus(earnings.incomeTax)
    .plus(earnings.netFinanceCosts)
    .plus(earnings.depreciationAndAmortisation);

/**
 * EBITDA down from revenue, before anything that stands below gross profit besides operating costs.
 *
 * @example ebitdaFromRevenue({ revenue: decimal(80), costOfSales: decimal(50), operatingCosts: decimal(18) }) // => 12
 */
export const ebitdaFromRevenue = ({
  revenue,
  costOfSales,
  operatingCosts,
}: {
  readonly revenue: Decimal;
  readonly costOfSales: Decimal;
  readonly operatingCosts: Decimal;
}): Decimal => revenue.minus(costOfSales).minus(operatingCosts);

export interface RouteDifference {
  /** From revenue less from net income. */
  readonly difference: Decimal;
  /** What the difference is called; null where there is none. */
  readonly name: string | null;
}

/**
 * The difference between the two routes, by name: what the bottom route holds and the way down from revenue does
 * not is income (or cost) below gross profit. Source: methods.md A3.
 *
 * @example routeDifference({ fromRevenue: decimal('11.7'), fromNetIncome: decimal(12) }).name // => 'other income 0.3 below gross profit'
 */
export function routeDifference({
  fromRevenue,
  fromNetIncome,
}: {
  readonly fromRevenue: Decimal;
  readonly fromNetIncome: Decimal;
}): RouteDifference {
  const difference = fromRevenue.minus(fromNetIncome);
  if (difference.isZero()) return { difference, name: null };
  const kind = difference.lt(0) ? 'income' : 'cost';
  return { difference, name: `other ${kind} ${formatMoneyInFull(difference.abs())} below gross profit` };
}

export interface MeasuredEbitda {
  readonly ebitda: Reading;
  readonly bridge: readonly BridgeLine[];
}

interface EbitdaPart {
  readonly line: LineItemCode;
  readonly label: string;
  readonly sign: 1 | -1;
  readonly presence: Presence;
}

const PARTS: readonly EbitdaPart[] = [
  { line: 'net_income', label: 'Net income', sign: 1, presence: 'required' },
  { line: 'income_tax', label: 'Income tax', sign: 1, presence: 'required' },
  { line: 'interest_expense', label: 'Interest expense', sign: 1, presence: 'required' },
  { line: 'interest_income', label: 'Interest income', sign: -1, presence: 'optional' },
  {
    line: 'depreciation_and_amortisation',
    label: 'Depreciation and amortisation',
    sign: 1,
    presence: 'required',
  },
];
const WITH_IMPAIRMENT: readonly EbitdaPart[] = [
  ...PARTS,
  { line: 'impairment', label: 'Impairment', sign: 1, presence: 'optional' },
];

/**
 * EBITDA of the twelve months up to a period end, from net income, with its bridge, in the statements' currency.
 *
 * Whole currency units. Missing names every line and period that is not there.
 *
 * @example ebitdaOfTwelveMonths(book, '2026-09-30').ebitda.value // => 13000000
 */
export function ebitdaOfTwelveMonths(book: StatementBook, date: PlainDate): MeasuredEbitda {
  let ofBook = KNOWN.get(book);
  if (!ofBook) KNOWN.set(book, (ofBook = new Map<PlainDate, MeasuredEbitda>()));
  const known = ofBook.get(date);
  if (known) return known;
  const measured = addedUp(PARTS, ({ line, presence }) => lastTwelveMonths(book, line, date, presence));
  ofBook.set(date, measured);
  return measured;
}

/** Several covenants of a borrower rest on the same EBITDA; a book never changes, so it is kept as long as the book is. */
const KNOWN = new WeakMap<StatementBook, Map<PlainDate, MeasuredEbitda>>();

/**
 * EBITDA as a covenant takes it before any add-back: over its months, in its currency, impairment added where the
 * agreement adds it.
 *
 * @example ebitdaIn(request).ebitda.value // => 13000000
 */
export function ebitdaIn(request: MeasureRequest): MeasuredEbitda {
  const { book, date, months, definition, translation } = request;
  if (!definition.impairmentAddedBack && months === 12 && book.currency === translation.currency)
    return ebitdaOfTwelveMonths(book, date);
  return addedUp(definition.impairmentAddedBack ? WITH_IMPAIRMENT : PARTS, ({ line, presence }) =>
    flowIn(request, line, presence),
  );
}

function addedUp(parts: readonly EbitdaPart[], read: (part: EbitdaPart) => Reading): MeasuredEbitda {
  const lines = parts.map((part) => ({ ...part, reading: read(part) }));
  const ebitda = sumOfReadings(lines);
  return {
    ebitda,
    bridge: [
      ...lines.flatMap(({ label, sign, reading }) => bridgeFigure(label, reading, sign)),
      ...bridgeSubtotal('EBITDA', ebitda),
    ],
  };
}
