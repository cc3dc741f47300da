/** The tests joined with the reporting quality of their quarter ends, once both are there. */
import type { BorrowerInputs } from './borrowerInputs.ts';
import { isSamePeriodEnd } from './calendar/fiscalYear.ts';
import type { CovenantTest } from './covenants/covenantTest.ts';
import { withAccrualsTakenOut } from './covenants/onAccruals.ts';
import type { ReportingQuality } from './quality/score.ts';
import type { Books } from './statements/statementBook.ts';

/**
 * The tests with what they would have come to on earnings that cash and peers show. Quality is read from the group's
 * accounts where there are any and in the borrower's currency: a covenant on other accounts, or in another currency,
 * is left as it is. Source: methods.md B7.
 *
 * @example testsOnAccruals(inputs, openBooks(inputs, '2026-11-30'), assessment.tests, assessment.quality).length === assessment.tests.length // => true
 */
export function testsOnAccruals(
  { covenants, currency }: Pick<BorrowerInputs, 'covenants' | 'currency'>,
  books: Books,
  tests: readonly CovenantTest[],
  { history }: Pick<ReportingQuality, 'history'>,
): readonly CovenantTest[] {
  const scored = books.group.statements.length > 0 ? 'group' : 'stand-alone';
  return tests.map((test) => {
    const covenant = covenants.find(({ id }) => id === test.covenantId);
    const quarter = history.find(({ quarterEnd }) => isSamePeriodEnd(quarterEnd, test.testDate));
    if (!covenant || !quarter?.earningsAtRisk) return test;
    if (covenant.scope !== scored || covenant.currency !== currency) return test;
    return withAccrualsTakenOut(test, covenant, quarter.earningsAtRisk);
  });
}
