/** One invented borrower with much to assess: 24 quarters of statements, four covenants tested over the last 16. */
import type { BorrowerInputs } from '#core/borrowerInputs.ts';
import { addDays, addMonthsToMonthEnd } from '#core/calendar/plainDate.ts';
import { buildAddBack, buildCovenant, buildLevel } from '#core/covenants/covenant.fixture.ts';
import type { Covenant } from '#core/covenants/covenant.ts';
import { ZERO, type Decimal } from '#core/money/decimal.ts';
import { buildBorrower, LAST_QUARTER_END } from '#core/quality/book.fixture.ts';
import type { LineItemCode } from '#core/statements/lineItems.ts';
import type { Amounts, Statement } from '#core/statements/statement.ts';

export const QUARTERS = 24;
export const TESTED_QUARTERS = 16;

const firstTestOn = addMonthsToMonthEnd(LAST_QUARTER_END, -3 * (TESTED_QUARTERS - 1));
const stepDown = addMonthsToMonthEnd(LAST_QUARTER_END, 5);
const addBacks = Array.from({ length: TESTED_QUARTERS }, (_, k) =>
  buildAddBack(addMonthsToMonthEnd(LAST_QUARTER_END, -3 * k), 50_000, { id: k + 1, capped: k % 2 === 0 }),
);

const levelsOf = (now: string, later: string) => [
  buildLevel(firstTestOn, stepDown, now),
  buildLevel(addDays(stepDown, 1), null, later),
];
const covenants: readonly Covenant[] = [
  buildCovenant({ id: 1, measure: 'net-leverage', levels: levelsOf('3.5', '3.25') }),
  buildCovenant({ id: 2, measure: 'total-leverage', levels: levelsOf('4', '3.5') }),
  buildCovenant({ id: 3, measure: 'interest-cover', operator: '>=', levels: levelsOf('4', '4.5') }),
  buildCovenant({ id: 4, measure: 'current-ratio', operator: '>=', levels: levelsOf('1.2', '1.25') }),
].map((covenant) => ({ ...covenant, firstTestOn, addBacks }));

/** Quarter by quarter, as the fixture gives them. */
export const inQuarters: BorrowerInputs = { ...buildBorrower(1, { quarters: QUARTERS }), covenants };

/** The same figures as years to date, which is how most borrowers send them. */
export const inYearsToDate: BorrowerInputs = {
  ...inQuarters,
  statements: inQuarters.statements.map((statement) =>
    statement.months === 0 ? statement : yearToDate(statement, inQuarters.statements),
  ),
};

/** Every period a second time, a year later, a hundredth up: each figure has a version before it. */
export const restated: BorrowerInputs = {
  ...inYearsToDate,
  statements: inYearsToDate.statements.flatMap((statement) => [
    statement,
    {
      ...statement,
      id: statement.id + 1_000_000,
      version: 2,
      receivedOn: addDays(statement.receivedOn, 300),
      amounts: mapAmounts(statement.amounts, (_, amount) => amount.times('1.01')),
    },
  ]),
};

function yearToDate(quarter: Statement, all: readonly Statement[]): Statement {
  const months = Number(quarter.periodEnd.slice(5, 7));
  const year = quarter.periodEnd.slice(0, 4);
  const parts = all.filter(
    (one) => one.months > 0 && one.periodEnd.startsWith(year) && one.periodEnd <= quarter.periodEnd,
  );
  const amounts = mapAmounts(quarter.amounts, (line) =>
    parts.reduce((sum, { amounts: part }) => sum.plus(part[line] ?? 0), ZERO),
  );
  return { ...quarter, months, amounts };
}

function mapAmounts(amounts: Amounts, change: (line: LineItemCode, amount: Decimal) => Decimal): Amounts {
  return Object.fromEntries(
    Object.entries(amounts).map(([line, amount]) => [line, change(line as LineItemCode, amount)]),
  );
}
