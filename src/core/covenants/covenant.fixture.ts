/** Covenants for tests: what matters is named, the rest is ordinary. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { PLAIN_DEFINITION } from '../measures/definition.ts';
import { decimal } from '../money/decimal.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import type { AddBack, Covenant, CovenantLevel } from './covenant.ts';

export const buildCovenant = (given: Partial<Covenant> = {}): Covenant => ({
  id: 1,
  facilityId: 1,
  name: 'Net leverage',
  clause: '20.2(a)',
  measure: 'net-leverage',
  operator: '<=',
  roundingPlaces: null,
  scope: 'group',
  basis: null,
  isOurs: false,
  currency: 'EUR',
  firstTestOn: '2025-03-31',
  everyMonths: 3,
  definition: PLAIN_DEFINITION,
  levels: [buildLevel('2025-01-01', null, '3.5')],
  addBacks: [],
  waivers: [],
  springing: null,
  cureRights: null,
  cures: [],
  ...given,
});

export const buildLevel = (
  from: PlainDate,
  until: PlainDate | null,
  level: string | null,
): CovenantLevel => ({
  from,
  until,
  level: level === null ? null : decimal(level),
  isReset: false,
});

export const buildAddBack = (
  periodEnd: PlainDate,
  amount: number,
  given: Partial<AddBack> = {},
): AddBack => ({
  id: 1,
  periodEnd,
  months: 3,
  label: 'Restructuring',
  amount: decimal(amount),
  capped: false,
  reason: 'plant closure',
  evidence: 'board paper of March',
  approvedBy: null,
  ...given,
});

/**
 * A year's figures to a date: EBITDA as given (net income takes what is left), debt and cash on its last day.
 * Tax 1.6, interest expense 2.5 and depreciation 3.7, all in units of the figures given.
 */
export function buildYear(
  periodEnd: PlainDate,
  { ebitda, debt, cash }: { readonly ebitda: number; readonly debt: number; readonly cash: number },
  given: Partial<Statement> = {},
): readonly Statement[] {
  const others = decimal('1.6').plus('2.5').plus('3.7');
  return [
    buildStatement(
      periodEnd,
      12,
      {
        revenue: 80,
        net_income: decimal(ebitda).minus(others).toFixed(),
        income_tax: '1.6',
        interest_expense: '2.5',
        depreciation: '3.0',
        amortisation: '0.7',
      },
      given,
    ),
    buildStatement(
      periodEnd,
      0,
      { senior_debt: debt, cash, current_assets: 30, current_liabilities: 20 },
      given,
    ),
  ];
}
