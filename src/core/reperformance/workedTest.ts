/** One covenant test as formulas from its source cells to its outcome, so that anybody can compute it again. */
import type { Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import type { Decimal } from '../money/decimal.ts';
import type { Policy } from '../policy.ts';
import type { SourceCell, WorkedRow, WorkedTest } from './worked.ts';
import { workedBridge } from './workedBridge.ts';
import { workedLines } from './workedLines.ts';
import { workedResult } from './workedResult.ts';

/**
 * The formulas of one test. Every formula's value is checked against the result in decimals while it is built: a row
 * that no formula gives is open, never forced.
 *
 * @example workedTest(test, covenant, POLICY_VERSION_1, []).result.at(-1)?.value // => 'met'
 */
export function workedTest(
  test: CovenantTest,
  covenant: Covenant,
  policy: Pick<Policy, 'thinBelow'>,
  cells: readonly (SourceCell & { readonly number: Decimal | null })[],
): WorkedTest {
  const lines = workedLines(test, cells);
  const bridge = workedBridge(test, covenant, lines);
  return { lines, bridge, result: workedResult(test, covenant, policy, bridge) };
}

/**
 * The rows whose value no formula gives.
 *
 * @example openRows(workedTest(test, covenant, POLICY_VERSION_1, [])) // => []
 */
export const openRows = ({ bridge, result }: WorkedTest): readonly WorkedRow[] =>
  [...bridge, ...result].filter(({ isOpen }) => isOpen);
