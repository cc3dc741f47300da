/** One covenant test as formulas from its source cells to its outcome, so that anybody can compute it again. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import type { Decimal } from '../money/decimal.ts';
import type { Policy } from '../policy.ts';
import { workedBridge } from './workedBridge.ts';
import { workedLines, type SourceCell } from './workedLines.ts';
import { workedResult } from './workedResult.ts';

/** A cell of a borrower's file, with the number that stands in it. */
export interface WorkedCell extends SourceCell {
  readonly key: string;
  /** Null where the text is no number. */
  readonly number: Decimal | null;
}

/** One line of one statement: its cells added up, times what one of the sheet's units is worth. */
export interface WorkedLine {
  readonly key: string;
  readonly label: string;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly cells: readonly WorkedCell[];
  /** 1,000 for a sheet in thousands, −1 for one with its signs turned; null where the amount does not follow from its cells. */
  readonly factor: Decimal | null;
  readonly amount: Decimal;
}

/**
 * One row of the computation. `{key}` in a formula stands for another row's value; without a formula the row is as
 * recorded or, where `isOpen`, as computed and not worked out here.
 */
export interface WorkedRow {
  readonly key: string;
  readonly label: string;
  readonly unit: 'money' | 'times' | 'share' | 'words';
  /** Null where it has no value. */
  readonly value: Decimal | string | null;
  readonly formula: string | null;
  readonly isOpen: boolean;
  readonly note: string;
}

export interface WorkedTest {
  readonly lines: readonly WorkedLine[];
  readonly bridge: readonly WorkedRow[];
  readonly result: readonly WorkedRow[];
}

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
