import type { PlainDate } from '../calendar/plainDate.ts';
import { inForce, statementOf, versionsOf } from './currentStatements.ts';
import { lineInputs } from './lineAmount.ts';
import type { LineItemCode } from './lineItems.ts';
import { sumOfInputs } from './reading.ts';
import type { Statement } from './statement.ts';

/**
 * Why a pair of periods would mix versions of the accounts: this period's line was restated after the other period
 * was last received. Null where it was not. Without the earlier version at hand a restated line counts as changed.
 * Source: methods.md A3, all parts of twelve months from one version.
 *
 * @example restatedAlone(statements, 'revenue', ['2025-12-31', 12], ['2025-09-30', 9]) // => null
 */
export function restatedAlone(
  statements: readonly Statement[],
  line: LineItemCode,
  restated: readonly [PlainDate, number],
  other: readonly [PlainDate, number],
): string | null {
  const current = statementOf(statements, ...restated);
  const unchanged = statementOf(statements, ...other);
  if (!current || !unchanged || current.version === 1 || unchanged.receivedOn >= current.receivedOn)
    return null;
  if (!statements.some((later) => isReportedBefore(later, current))) return null;
  const before = inForce(
    versionsOf(statements, ...restated).filter(
      ({ basis, version }) => basis === current.basis && version < current.version,
    ),
  );
  const [now, then] = [lineInputs(current, line), before && lineInputs(before, line)];
  if (now && then && sumOfInputs(now).eq(sumOfInputs(then))) return null;
  return `${line} of the ${current.months} months to ${current.periodEnd} was restated on ${current.receivedOn}, the ${unchanged.months} months to ${unchanged.periodEnd} were not: the two versions are not mixed`;
}

// A new version before any later period is out closes the books of the period; after that it restates them.
const isReportedBefore = (later: Statement, restated: Statement): boolean =>
  later.months > 0 && later.periodEnd > restated.periodEnd && later.receivedOn <= restated.receivedOn;
