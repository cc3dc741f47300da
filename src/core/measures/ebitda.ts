/** EBITDA, built from the bottom of the income statement and held against the way down from revenue. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { ZERO, type Decimal } from '../money/decimal.ts';
import { lastTwelveMonths } from '../statements/flows.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { bridgeFigure, bridgeSubtotal, type BridgeLine } from './bridge.ts';

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
 * All in one currency unit. Impairment is not added: agreements that add non-cash charges list them as add-backs.
 * Source: methods.md A3.
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
  return { difference, name: `other ${kind} ${difference.abs().toFixed()} below gross profit` };
}

export interface MeasuredEbitda {
  readonly ebitda: Reading;
  readonly bridge: readonly BridgeLine[];
}

/**
 * EBITDA of the twelve months up to a period end, from net income, with its bridge.
 *
 * Whole currency units. Missing names every line and period that is not there.
 *
 * @example ebitdaOfTwelveMonths(book, '2026-09-30').ebitda.value // => 13000000
 */
export function ebitdaOfTwelveMonths(book: StatementBook, date: PlainDate): MeasuredEbitda {
  const parts = [
    { label: 'Net income', sign: 1 as const, reading: lastTwelveMonths(book, 'net_income', date) },
    { label: 'Income tax', sign: 1 as const, reading: lastTwelveMonths(book, 'income_tax', date) },
    {
      label: 'Interest expense',
      sign: 1 as const,
      reading: lastTwelveMonths(book, 'interest_expense', date),
    },
    {
      label: 'Interest income',
      sign: -1 as const,
      reading: lastTwelveMonths(book, 'interest_income', date, 'optional'),
    },
    {
      label: 'Depreciation and amortisation',
      sign: 1 as const,
      reading: lastTwelveMonths(book, 'depreciation_and_amortisation', date),
    },
  ];
  // Kept under the line it starts from: several covenants of a borrower rest on the same EBITDA.
  const ebitda = book.kept('EBITDA', 'net_income', date, () => sumOfReadings(parts));
  return {
    ebitda,
    bridge: [
      ...parts.flatMap(({ label, sign, reading }) => bridgeFigure(label, reading, sign)),
      ...bridgeSubtotal('EBITDA', ebitda),
    ],
  };
}

const OPERATING_COSTS = [
  'sga',
  'staff_costs',
  'research_development',
  'rent_expense',
  'other_operating_expense',
] as const satisfies readonly LineItemCode[];

/**
 * EBITDA of twelve months from revenue less EBITDA from net income, by name; null where the way down from revenue is
 * not there. Source: methods.md A3.
 *
 * @example routesOfTwelveMonths(book, '2026-09-30') // => null
 */
export function routesOfTwelveMonths(book: StatementBook, date: PlainDate): RouteDifference | null {
  const { ebitda } = ebitdaOfTwelveMonths(book, date);
  const [revenue, costOfSales] = [
    lastTwelveMonths(book, 'revenue', date),
    lastTwelveMonths(book, 'cogs', date),
  ];
  const operating = sumOfReadings(
    OPERATING_COSTS.map((line) => ({
      sign: 1 as const,
      reading: lastTwelveMonths(book, line, date, 'optional'),
    })),
  );
  if (ebitda.kind !== 'value' || revenue.kind !== 'value' || costOfSales.kind !== 'value') return null;
  if (operating.kind !== 'value' || operating.value.eq(ZERO)) return null;
  return routeDifference({
    fromRevenue: ebitdaFromRevenue({
      revenue: revenue.value,
      costOfSales: costOfSales.value,
      operatingCosts: operating.value,
    }),
    fromNetIncome: ebitda.value,
  });
}
