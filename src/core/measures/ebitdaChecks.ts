/** What stands beside EBITDA without entering it: as the borrower states it, by the other route, over 52 weeks. */
import { Decimal, ZERO } from '../money/decimal.ts';
import { formatMoneyInFull, formatShare } from '../money/print.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { lineItem } from '../statements/lineItems.ts';
import {
  daysOfFlow,
  DAYS_OF_LONGEST_YEAR,
  equivalentOf52Weeks,
  lengthInWords,
} from '../statements/periodLength.ts';
import type { Reading } from '../statements/reading.ts';
import type { BridgeLine } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import { ebitdaFromRevenue } from './ebitda.ts';
import { flowIn } from './readLines.ts';

type Value = Extract<Reading, { kind: 'value' }>;

const OPERATING_COSTS = [
  'sga',
  'staff_costs',
  'research_development',
  'rent_expense',
  'other_operating_expense',
] as const satisfies readonly LineItemCode[];

/** What net income holds and the way down from revenue does not, with the sign it has in net income. */
const BESIDE_THE_WAY_DOWN = [
  { line: 'other_operating_income', sign: 1 },
  { line: 'capitalised_costs', sign: 1 },
  { line: 'other_non_operating', sign: 1 },
  { line: 'impairment', sign: -1 },
] as const satisfies readonly { readonly line: LineItemCode; readonly sign: 1 | -1 }[];

/** A remainder this near to depreciation and amortisation says that they stand inside the costs. */
const SHARE_OF_ROUNDING = '0.001';

/**
 * Lines beside EBITDA, none of which enters it. Empty where there is nothing to hold it against.
 *
 * @example ebitdaChecks(request, { kind: 'value', value: decimal(13e6), inputs: [] }) // => []
 */
export const ebitdaChecks = (request: MeasureRequest, ebitda: Value): readonly BridgeLine[] => [
  ...statedByBorrower(request, ebitda.value),
  ...downFromRevenue(request, ebitda.value),
  ...over52Weeks(request, ebitda),
];

function statedByBorrower(request: MeasureRequest, ebitda: Decimal): readonly BridgeLine[] {
  if (!isThere(request, 'ebitda_reported')) return [];
  const stated = flowIn(request, 'ebitda_reported');
  if (stated.kind !== 'value') return [];
  const { value, inputs } = stated;
  const more = value.minus(ebitda);
  return [
    {
      label: 'EBITDA as the borrower states it',
      amount: value,
      kind: 'check',
      inputs,
      note: more.isZero()
        ? 'the same as its accounts give'
        : `${formatMoneyInFull(more.abs())} ${more.gt(0) ? 'more' : 'less'} than its accounts give${shareOf(more, ebitda)}`,
    },
  ];
}

const shareOf = (difference: Decimal, ebitda: Decimal): string =>
  ebitda.gt(0) ? ` (${formatShare(difference.abs().div(ebitda))})` : '';

/** EBITDA by the other route, with the difference taken apart by the lines that only one of them holds. */
function downFromRevenue(request: MeasureRequest, fromNetIncome: Decimal): readonly BridgeLine[] {
  if (!isThere(request, 'revenue') || !isThere(request, 'cogs')) return [];
  const operating = OPERATING_COSTS.filter((line) => isThere(request, line));
  if (operating.length === 0) return [];
  const amounts = ['revenue' as const, 'cogs' as const, ...operating].map((line) => flowIn(request, line));
  const [revenue, costOfSales, ...costs] = amounts.map((reading) =>
    reading.kind === 'value' ? reading.value : null,
  );
  const known = costs.filter((cost) => cost !== null);
  if (!revenue || !costOfSales || known.length < costs.length) return [];
  const fromRevenue = ebitdaFromRevenue({
    revenue,
    costOfSales,
    operatingCosts: Decimal.sum(0, ...known),
  });
  const note = differenceByName(request, fromNetIncome.minus(fromRevenue));
  return [{ label: 'EBITDA down from revenue', amount: fromRevenue, kind: 'check', inputs: [], note }];
}

function differenceByName(request: MeasureRequest, difference: Decimal): string {
  if (difference.isZero()) return 'the same as from net income';
  const parts = BESIDE_THE_WAY_DOWN.flatMap(({ line, sign }) => {
    const reading = isThere(request, line) ? flowIn(request, line) : null;
    // What the agreement adds back is in neither route.
    if (reading?.kind !== 'value' || (line === 'impairment' && request.definition.impairmentAddedBack))
      return [];
    return reading.value.isZero() ? [] : [{ name: lineItem(line).label, amount: reading.value.times(sign) }];
  });
  const rest = difference.minus(Decimal.sum(0, ...parts.map(({ amount }) => amount)));
  const named = [...parts, ...(rest.isZero() ? [] : [{ name: nameOfRest(request, rest), amount: rest }])];
  const isLess = difference.gt(0);
  const signs = named.map(
    ({ name, amount }) =>
      `${amount.gt(0) === isLess ? '' : 'less '}${lowerCase(name)} ${formatMoneyInFull(amount.abs())}`,
  );
  return `${formatMoneyInFull(difference.abs())} ${isLess ? 'less' : 'more'} than from net income: ${signs.join(', ')}`;
}

function nameOfRest(request: MeasureRequest, rest: Decimal): string {
  const reading = flowIn(request, 'depreciation_and_amortisation');
  const charge = reading.kind === 'value' ? reading.value : ZERO;
  const isCharge = charge.gt(0) && rest.minus(charge).abs().lte(charge.times(SHARE_OF_ROUNDING));
  if (isCharge) return 'depreciation and amortisation inside the costs';
  return rest.gt(0) ? 'other income below gross profit' : 'other cost below gross profit';
}

/** A note for years of 53 weeks; the reported figure is what is tested. */
function over52Weeks({ book, months }: MeasureRequest, { value, inputs }: Value): readonly BridgeLine[] {
  if (months !== 12) return [];
  const days = daysOfFlow(book.statements, inputs);
  if (days === null || days <= DAYS_OF_LONGEST_YEAR || days % 7 !== 0) return [];
  return [
    {
      label: 'EBITDA over 52 weeks',
      amount: equivalentOf52Weeks(value, days / 7),
      kind: 'check',
      inputs: [],
      note: `the tested figure is of ${lengthInWords(days)}`,
    },
  ];
}

const isThere = ({ book, date }: MeasureRequest, line: LineItemCode): boolean => book.isCarriedBy(line, date);

const lowerCase = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1);
