/** Statements and covenants that say what a vector says and nothing else. */
import type { Covenant, CovenantLevel, Waiver } from '#core/covenants/covenant.ts';
import { addDays, addMonthsToMonthEnd, type PlainDate } from '#core/calendar/plainDate.ts';
import { PLAIN_DEFINITION } from '#core/measures/definition.ts';
import { decimal, ZERO, type Decimal } from '#core/money/decimal.ts';
import type { Amounts, Statement } from '#core/statements/statement.ts';

export const statementOf = (
  id: number,
  periodEnd: PlainDate,
  months: number,
  amounts: Amounts,
  given: Partial<Statement> = {},
): Statement => ({
  id,
  periodStart: months === 0 ? periodEnd : addDays(addMonthsToMonthEnd(periodEnd, -months), 1),
  periodEnd,
  months,
  basis: 'management',
  scope: 'group',
  framework: 'IFRS',
  currency: 'EUR',
  roundingUnit: decimal('0.000001'),
  amounts,
  tie: 'not-checked',
  version: 1,
  receivedOn: periodEnd,
  importId: null,
  ...given,
});

/** A year and a balance sheet with just this EBITDA and this net debt. */
export const yearWith = (
  periodEnd: PlainDate,
  { ebitda, netDebt }: { readonly ebitda: Decimal; readonly netDebt: Decimal },
  given: Partial<Statement> & { readonly id: number } = { id: 1 },
): readonly Statement[] => [
  statementOf(
    given.id,
    periodEnd,
    12,
    {
      net_income: ebitda,
      income_tax: ZERO,
      interest_expense: ZERO,
      depreciation: ZERO,
    },
    given,
  ),
  statementOf(
    given.id + 1,
    periodEnd,
    0,
    { senior_debt: netDebt, cash: ZERO },
    { ...given, id: given.id + 1 },
  ),
];

export const netLeverageCovenant = (
  levels: readonly CovenantLevel[],
  firstTestOn: PlainDate,
  waivers: readonly Waiver[] = [],
): Covenant => ({
  id: 1,
  facilityId: 1,
  name: 'Net leverage',
  clause: '',
  measure: 'net-leverage',
  operator: '<=',
  roundingPlaces: null,
  scope: 'group',
  basis: null,
  isOurs: false,
  currency: 'EUR',
  firstTestOn,
  everyMonths: 3,
  definition: PLAIN_DEFINITION,
  levels,
  addBacks: [],
  waivers,
  springing: null,
  cureRights: null,
  cures: [],
});
