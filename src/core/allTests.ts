import type { BorrowerInputs } from './borrowerInputs.ts';
import { reportingMonthEnd } from './calendar/fiscalYear.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import type { CovenantTest } from './covenants/covenantTest.ts';
import { testDates } from './covenants/levels.ts';
import { testCovenant } from './covenants/testCovenant.ts';
import type { Policy } from './policy.ts';
import type { Books } from './statements/statementBook.ts';

/**
 * Every test date up to the day, oldest first within a covenant; those before the first figures that are kept here
 * are left out.
 *
 * @example allTests(inputs, openBooks(inputs, '2026-11-30'), POLICY_VERSION_1, '2026-11-30').at(-1)?.testDate // => '2026-09-30'
 */
export const allTests = (
  { covenants }: BorrowerInputs,
  books: Books,
  policy: Policy,
  asOf: PlainDate,
): readonly CovenantTest[] =>
  covenants.flatMap((covenant) => {
    const book = books[covenant.scope];
    const [first] = book.current;
    return testDates(covenant, asOf)
      .filter((date) => !first || reportingMonthEnd(first.periodEnd) <= date)
      .map((date) => testCovenant(covenant, book, date, policy, asOf));
  });
