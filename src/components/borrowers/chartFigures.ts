import type { CovenantView, TestView } from '../../contracts/borrowers.ts';
import type { ChartLevel, LimitChartFigures } from '../marks/limitChartFigures.ts';
import { isMaximumTest } from './figures.ts';

/** A covenant's tests and levels as the limit chart draws them. */
export const chartFigures = (covenant: CovenantView): LimitChartFigures => ({
  label: covenant.name,
  unit: covenant.unit,
  maximum: isMaximumTest(covenant),
  results: covenant.tests.map(({ testDate, tested, outcome, justPassing }) => ({
    testDate,
    tested,
    outcome,
    justPassing,
  })),
  levels: levelsOf(covenant),
  second: covenant.tests.some((test) => test.withoutAddBacks !== null)
    ? {
        name: 'without add-backs',
        values: covenant.tests.map((test) => ({ testDate: test.testDate, tested: test.withoutAddBacks })),
      }
    : null,
});

/** The level in force at each test joined into steps, then the levels that are still to come. */
function levelsOf(covenant: CovenantView): ChartLevel[] {
  const steps: { from: string; until: string | null; level: string | null }[] = [];
  let before: TestView | null = null;
  for (const test of covenant.tests) {
    if (before === null || before.level !== test.level) {
      const last = steps.at(-1);
      if (last && before) last.until = before.testDate;
      steps.push({ from: before?.testDate ?? test.testDate, until: null, level: test.level });
    }
    before = test;
  }
  const last = steps.at(-1);
  const [next] = covenant.laterLevels;
  if (last && next) last.until = next.from;
  return [
    ...steps,
    ...covenant.laterLevels.map((later, at) => ({
      from: later.from,
      until: covenant.laterLevels[at + 1]?.from ?? null,
      level: later.level,
    })),
  ];
}
