import type { PlainDate } from '../calendar/plainDate.ts';
import { lineInputs } from './lineAmount.ts';
import type { LineItemCode } from './lineItems.ts';
import { sumOfInputs } from './reading.ts';
import type { Statement } from './statement.ts';
import type { StatementBook } from './statementBook.ts';

/**
 * Why a pair of periods would mix versions of the accounts: this period's line was restated after the other period
 * was last received. Null where it was not. Without the earlier version at hand a restated line counts as changed.
 * Source: methods.md A3, all parts of twelve months from one version.
 *
 * @example restatedAlone(book, 'revenue', ['2025-12-31', 12], ['2025-09-30', 9]) // => null
 */
export function restatedAlone(
  book: StatementBook,
  line: LineItemCode,
  restated: readonly [PlainDate, number],
  other: readonly [PlainDate, number],
): string | null {
  const current = book.statementOf(...restated);
  const unchanged = book.statementOf(...other);
  if (!current || !unchanged || current.version === 1 || unchanged.receivedOn >= current.receivedOn)
    return null;
  if (!book.isRestating(current)) return null;
  const before = versionBefore(book, current);
  const [now, then] = [lineInputs(book, current, line), before && lineInputs(book, before, line)];
  if (now && then && sumOfInputs(now).eq(sumOfInputs(then))) return null;
  return `${line} of the ${current.months} months to ${current.periodEnd} was restated on ${current.receivedOn}, the ${unchanged.months} months to ${unchanged.periodEnd} were not: the two versions are not mixed`;
}

const versionBefore = (
  book: StatementBook,
  { basis, version, periodEnd, months }: Statement,
): Statement | null =>
  book
    .versionsOf(periodEnd, months)
    .filter((other) => other.basis === basis && other.version < version)
    .reduce<Statement | null>((latest, one) => (latest && latest.version > one.version ? latest : one), null);
