/** Add-backs of the stories: as much as brings the reading of each test to what the borrower certified. */
import type { DemoAddBack } from './demoCovenant.ts';
import type { DemoQuarter } from './demoLines.ts';
import { netDebt, yearEbitda } from './ratios.ts';

const LABELS = [
  {
    label: 'Restructuring costs',
    reason: 'Severance and closure costs of the second works',
    evidence: 'Certificate, schedule 2',
  },
  {
    label: 'Run-rate savings of the closure',
    reason: 'Savings that the closure is expected to bring within twelve months',
    evidence: 'Board paper, page 4',
  },
] as const;

/**
 * One add-back a quarter from the year of the first target on, so that the four quarters up to each test bring net leverage to
 * the target's, or below it where earlier ones already do more.
 */
export function addBacksToReach(
  quarters: readonly DemoQuarter[],
  targets: ReadonlyMap<number, number>,
): DemoAddBack[] {
  const amounts: number[] = quarters.map(() => 0);
  const indices = [...targets.keys()].toSorted((one, other) => one - other);
  const [start] = indices;
  // The first test's add-backs were claimed over the year before it, evenly.
  if (start !== undefined) {
    const quarterly = Math.floor(
      Math.max(0, neededFor(quarters, start, targets.get(start) ?? Number.NaN)) / 4,
    );
    for (let index = start - 3; index < start; index += 1) amounts[index] = quarterly;
  }
  for (const index of indices) {
    const needed = neededFor(quarters, index, targets.get(index) ?? Number.NaN);
    const counted = amounts.slice(Math.max(0, index - 3), index).reduce((sum, amount) => sum + amount, 0);
    amounts[index] = Math.max(0, needed - counted);
  }
  return amounts.flatMap((amount, index) => {
    const quarter = quarters[index];
    const wording = LABELS[index % LABELS.length];
    return quarter && wording && amount > 0
      ? [{ ...wording, periodEnd: quarter.quarterEnd, amount, capped: true }]
      : [];
  });
}

function neededFor(quarters: readonly DemoQuarter[], index: number, target: number): number {
  const quarter = quarters[index];
  const ebitda = yearEbitda(quarters, index);
  if (!quarter || ebitda === null) throw new RangeError(`quarter ${index} has no four quarters behind it`);
  return Math.round(netDebt(quarter) / target - ebitda);
}

/** What add-backs sum to over the four quarters that end at the index. */
export const addBacksOfYear = (
  quarters: readonly DemoQuarter[],
  index: number,
  addBacks: readonly DemoAddBack[],
): number =>
  quarters
    .slice(Math.max(0, index - 3), index + 1)
    .flatMap((quarter) => addBacks.filter((addBack) => addBack.periodEnd === quarter.quarterEnd))
    .reduce((sum, addBack) => sum + addBack.amount, 0);
