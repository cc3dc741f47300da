/** What is said of a test's outcome beside it. */
import { daysOfFlow, DAYS_OF_LONGEST_YEAR, lengthInWords } from '../statements/periodLength.ts';
import type { Covenant } from './covenant.ts';
import type { Figures } from './figures.ts';
import type { Verdict } from './holdAgainstLevel.ts';
import { hasResult } from './latestLiveTest.ts';

/**
 * Why the outcome is what it is, and what it rests on; null where there is nothing to say. `waiverGone` says that a
 * waiver ran out, where one did.
 *
 * @example remarks(covenant, { tested: decimal('3.2'), outcome: 'met', reason: 'no debt', roundingDecides: false }, { remarks: [], statements: [], inputs: [] }, null) // => 'no debt'
 */
export function remarks(
  { roundingPlaces }: Covenant,
  held: Verdict,
  figures: Pick<Figures, 'remarks' | 'statements' | 'inputs'>,
  waiverGone: string | null,
): string | null {
  const said = [
    held.reason,
    waiverGone,
    held.roundingDecides ? `at the ${roundingPlaces} decimal places that the agreement rounds to` : null,
    ...(hasResult(held) ? [...figures.remarks, ...restsOnWhat(figures)] : []),
  ].filter((remark) => remark !== null);
  return said.length > 0 ? said.join('; ') : null;
}

function restsOnWhat({
  statements,
  inputs,
}: Pick<Figures, 'statements' | 'inputs'>): readonly (string | null)[] {
  const frameworks = [...new Set(statements.map(({ framework }) => framework))].sort();
  const days = daysOfFlow(statements, inputs);
  return [
    statements.some(({ tie }) => tie === 'does-not-tie') ? 'rests on figures that do not tie' : null,
    frameworks.length > 1
      ? `rests on ${frameworks.length === 2 ? 'two' : frameworks.length} accounting frameworks: ${frameworks.join(', ')}`
      : null,
    days !== null && days > DAYS_OF_LONGEST_YEAR ? `rests on ${lengthInWords(days)}` : null,
  ];
}
