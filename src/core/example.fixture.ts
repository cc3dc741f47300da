/**
 * What the examples in core's docstrings speak of. A name that stands free in an `@example` is exported here or by
 * the module itself; `tests/architecture/examples.test.ts` runs them all.
 */
import { buildContext, buildInputs, buildQuality, buildQuarterScore } from './alerts/rule.fixture.ts';
import type { AlertContext } from './alerts/rule.ts';
import { assess } from './assess.ts';
import { NO_BOOK } from './bookCrossSection.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import { buildAddBack, buildCovenant, buildLevel, buildYear } from './covenants/covenant.fixture.ts';
import type { Covenant } from './covenants/covenant.ts';
import { figuresOf } from './covenants/figures.ts';
import { testCovenant } from './covenants/testCovenant.ts';
import { netLeverage } from './measures/netLeverage.ts';
import { translationInto } from './measures/translation.ts';
import { decimal, ZERO } from './money/decimal.ts';
import { POLICY_VERSION_1 } from './policy.ts';
import { accountsAt } from './quality/accountsAt.ts';
import { buildBorrower, buildBook } from './quality/book.fixture.ts';
import { buildCrossSection } from './quality/crossSection.ts';
import { figureReader } from './quality/figureReader.ts';
import { peerInputs, peerInputsOfQuarters } from './quality/peerInputs.ts';
import { scoreQuarter } from './quality/quarterScore.ts';
import { buildStatement } from './statements/statement.fixture.ts';
import { bookOf, openBooks } from './statements/statementBook.ts';

export {
  buildAddBack,
  buildCovenant,
  buildInputs,
  buildLevel,
  buildQuality,
  buildQuarterScore,
  buildStatement,
  decimal,
  figureReader,
  netLeverage,
  openBooks,
  POLICY_VERSION_1,
  ZERO,
};

const asOf: PlainDate = '2026-11-30';

const yearToDate = (
  periodEnd: PlainDate,
  months: number,
  revenue: number,
  [net_income, income_tax, interest_expense, depreciation]: readonly [number, number, number, number],
) => buildStatement(periodEnd, months, { revenue, net_income, income_tax, interest_expense, depreciation });

/** Years to date whose twelve months to 30 September 2026 are revenue of 90m and EBITDA of 13m. */
export const statements = [
  yearToDate('2025-09-30', 9, 60e6, [3.0e6, 1.0e6, 1.8e6, 2.7e6]),
  yearToDate('2025-12-31', 12, 84e6, [4.2e6, 1.4e6, 2.4e6, 3.6e6]),
  yearToDate('2026-03-31', 3, 22e6, [1.2e6, 0.4e6, 0.6e6, 0.9e6]),
  yearToDate('2026-06-30', 6, 45e6, [2.4e6, 0.8e6, 1.2e6, 1.8e6]),
  yearToDate('2026-09-30', 9, 66e6, [4.0e6, 1.3e6, 1.8e6, 2.8e6]),
  buildStatement('2026-09-30', 0, {
    cash: 6e6,
    current_assets: 30e6,
    current_liabilities: 20e6,
    senior_debt: 45e6,
  }),
];

/** Net leverage of at most 3.50x, 2.75x from 2027 on; the figures above come to 3.00x. */
export const covenant = buildCovenant({
  levels: [buildLevel('2025-01-01', '2026-12-31', '3.5'), buildLevel('2027-01-01', null, '2.75')],
});
export const book = bookOf(statements, 12);
export const test = testCovenant(covenant, book, '2026-09-30', POLICY_VERSION_1, asOf);
export const figures = figuresOf(covenant, book, '2026-09-30');
export const accounts = accountsAt(book, '2026-09-30');
export const request = {
  book,
  date: '2026-09-30',
  definition: covenant.definition,
  addBacks: [],
  months: 12,
  translation: translationInto('EUR', []),
} as const;

/** What the rules of alerts see of one borrower with one leverage covenant at 3.50x and a year's figures in millions. */
export const nightOf = (
  millions: { readonly ebitda: number; readonly debt: number; readonly cash: number },
  given: Partial<Covenant> = {},
): AlertContext =>
  buildContext(
    buildInputs({
      statements: buildYear('2026-09-30', millions),
      covenants: [buildCovenant({ firstTestOn: '2026-09-30', ...given })],
    }),
    asOf,
  );

const borrowers = buildBook(12, 'metal goods', 1);
/** Twelve borrowers of one sector at their last quarter ends. */
export const peers = borrowers.flatMap((borrower) => peerInputsOfQuarters(borrower, asOf));
export const crossSection = { ...NO_BOOK, ...buildCrossSection(peers, 1) };
/** The first of them, and what its figures of 30 September 2026 bring to the comparison. */
export const inputs = { ...buildBorrower(1), covenants: [covenant] };
export const peer = peerInputs(inputs, '2026-09-30', asOf)!;
export const quarterScore = scoreQuarter(peer, crossSection);
export const assessment = assess(inputs, crossSection, POLICY_VERSION_1, asOf);

/** Two balance sheets a year apart of one small firm. */
export const openingSheet = {
  currentAssets: 46,
  cash: 8,
  totalAssets: 96,
  longTermInvestments: 0,
  currentLiabilities: 26,
  shortTermDebt: 5,
  taxPayable: 1,
  longTermDebt: 30,
  totalLiabilities: 58,
};
export const closingSheet: typeof openingSheet = {
  currentAssets: 56.5,
  cash: 7,
  totalAssets: 110,
  longTermInvestments: 0,
  currentLiabilities: 28.7,
  shortTermDebt: 6,
  taxPayable: 1.2,
  longTermDebt: 36.8,
  totalLiabilities: 67.5,
};

/** A year of the same firm as the M-score takes it. */
export const firmYear = {
  receivables: 20,
  currentAssets: 46,
  ppeNet: 40,
  totalAssets: 96,
  currentLiabilities: 26,
  longTermDebt: 30,
  sales: 118,
  costOfSales: 80,
  sellingAndAdministrative: 20,
  incomeFromContinuingOperations: 5,
  cashFromOperations: 4,
  depreciation: 6,
};
