import type { BorrowerInputs } from './borrowerInputs.ts';
import { reportingMonthEnd } from './calendar/fiscalYear.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import type { Covenant } from './covenants/covenant.ts';
import type { CovenantTest } from './covenants/covenantTest.ts';
import { testDates } from './covenants/levels.ts';
import { withRights } from './covenants/rights.ts';
import { withRoomInDeviations } from './covenants/roomInDeviations.ts';
import { testCovenant } from './covenants/testCovenant.ts';
import type { Policy } from './policy.ts';
import type { Books, StatementBook } from './statements/statementBook.ts';

/**
 * Every test date up to the day, oldest first within a covenant, with the rights of each agreement; those before the
 * first figures that are kept here are left out.
 *
 * @example allTests(inputs, openBooks(inputs, '2026-11-30'), POLICY_VERSION_1, '2026-11-30').at(-1)?.testDate // => '2026-09-30'
 */
export const allTests = (
  { covenants, undertakings, currency, rates }: BorrowerInputs,
  books: Books,
  policy: Policy,
  asOf: PlainDate,
): readonly CovenantTest[] =>
  covenants.flatMap((covenant) => {
    const ofScope = books[covenant.scope];
    const book = covenant.basis === null ? ofScope : ofScope.onBasis(covenant.basis);
    const tests = withRights(covenant, onEachDate(covenant, book, { policy, asOf, rates }), {
      undertakings,
      asOf,
    });
    return covenant.currency === currency ? withRoomInDeviations(tests, book) : tests;
  });

function onEachDate(
  covenant: Covenant,
  book: StatementBook,
  { policy, asOf, rates }: { policy: Policy; asOf: PlainDate; rates: BorrowerInputs['rates'] },
): readonly CovenantTest[] {
  const [first] = book.current;
  return testDates(covenant, asOf)
    .filter((date) => !first || reportingMonthEnd(first.periodEnd) <= date)
    .map((date) => testCovenant(covenant, book, date, policy, asOf, rates));
}
