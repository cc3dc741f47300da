/** EBITDA, built from the bottom of the income statement and held against the way down from revenue. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { ZERO, type Decimal } from '../money/decimal.ts';
import { lastTwelveMonths } from '../statements/flows.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { orNoneIfNeverCarried } from '../statements/optionalLine.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import type { Statement } from '../statements/statement.ts';
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
  /** From revenue less from net income, twelve months; null where the way down from revenue is not there. */
  readonly routes: RouteDifference | null;
  readonly bridge: readonly BridgeLine[];
}

/**
 * EBITDA of the twelve months up to a period end, from net income, with its bridge; the way down from revenue is
 * computed beside it and the difference named.
 *
 * Whole currency units. Missing names every line and period that is not there.
 *
 * @example ebitdaOfTwelveMonths(statements, '2026-09-30', 12).ebitda.value // => 13000000
 */
export function ebitdaOfTwelveMonths(
  statements: readonly Statement[],
  date: PlainDate,
  fiscalYearEndMonth: number,
): MeasuredEbitda {
  const twelveMonths = (line: LineItemCode) => lastTwelveMonths(statements, line, date, fiscalYearEndMonth);
  const optional = (line: LineItemCode) => orNoneIfNeverCarried(statements, line, twelveMonths(line));
  const parts = [
    { label: 'Net income', sign: 1 as const, reading: twelveMonths('net_income') },
    { label: 'Income tax', sign: 1 as const, reading: twelveMonths('income_tax') },
    { label: 'Interest expense', sign: 1 as const, reading: twelveMonths('interest_expense') },
    { label: 'Interest income', sign: -1 as const, reading: optional('interest_income') },
    {
      label: 'Depreciation and amortisation',
      sign: 1 as const,
      reading: twelveMonths('depreciation_and_amortisation'),
    },
  ];
  const ebitda = sumOfReadings(parts);
  return {
    ebitda,
    routes: routesOf(ebitda, twelveMonths, optional),
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

function routesOf(
  ebitda: Reading,
  twelveMonths: (line: LineItemCode) => Reading,
  optional: (line: LineItemCode) => Reading,
): RouteDifference | null {
  const [revenue, costOfSales] = [twelveMonths('revenue'), twelveMonths('cogs')];
  const operating = sumOfReadings(
    OPERATING_COSTS.map((line) => ({ sign: 1 as const, reading: optional(line) })),
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
