/** Covenant tests by plain ratio arithmetic, apart from the product's own. */
import type { MeasureCode } from '../../src/core/measures/measure.ts';
import { addBacksOfYear } from './addBackPlans.ts';
import type { DemoBorrower } from './demoBorrower.ts';
import type { DemoCovenant } from './demoCovenant.ts';
import type { DemoQuarter } from './demoLines.ts';
import { currentRatio, interestCover, liquidity, netLeverage, totalLeverage, yearEbitda } from './ratios.ts';

type Read = (quarters: readonly DemoQuarter[], index: number, addBacks: number) => number | null;

const READ: Readonly<Partial<Record<MeasureCode, Read>>> = {
  'net-leverage': netLeverage,
  'total-leverage': (quarters, index) => totalLeverage(quarters, index),
  'interest-cover': (quarters, index) => interestCover(quarters, index),
  'current-ratio': (quarters, index) => currentRatio(quarters, index),
  'minimum-liquidity': (quarters, index) => liquidity(quarters, index),
};

interface DemoTest {
  readonly level: number | null;
  readonly value: number | null;
  readonly withoutAddBacks: number | null;
  readonly addBacks: number;
  readonly ebitda: number;
}

export function testsOf({ quarters }: DemoBorrower, covenant: DemoCovenant | undefined): DemoTest[] {
  if (!covenant) throw new Error('a covenant expected');
  const read = READ[covenant.measure];
  if (!read) throw new Error(`no reading of ${covenant.measure}`);
  return quarters.flatMap(({ quarterEnd }, index) => {
    if (quarterEnd < covenant.firstTestOn) return [];
    const row = covenant.levels.find(
      ({ from, until }) => from <= quarterEnd && (until === null || until >= quarterEnd),
    );
    const addBacks = addBacksOfYear(quarters, index, covenant.addBacks);
    return {
      level: row?.level ?? null,
      value: read(quarters, index, addBacks),
      withoutAddBacks: read(quarters, index, 0),
      addBacks,
      ebitda: yearEbitda(quarters, index) ?? Number.NaN,
    };
  });
}

interface Room {
  readonly level: number;
  /** Share of the level; negative where the test is not met. */
  readonly room: number;
  readonly roomWithoutAddBacks: number;
}

/** Of each test that has a level, oldest first. With no interest to pay a cover leaves all the room there is. */
export function roomsOf(borrower: DemoBorrower, measure: string): Room[] {
  const covenant = borrower.covenants.find((one) => one.measure === measure);
  if (!covenant) throw new Error(`${borrower.name} has no ${measure}`);
  const isMaximum = covenant.operator.startsWith('<');
  const roomOf = (value: number | null, level: number): number => {
    if (value === null) return measure === 'interest-cover' ? Number.POSITIVE_INFINITY : Number.NaN;
    return isMaximum ? 1 - value / level : value / level - 1;
  };
  return testsOf(borrower, covenant).flatMap(({ level, value, withoutAddBacks }) =>
    level === null
      ? []
      : { level, room: roomOf(value, level), roomWithoutAddBacks: roomOf(withoutAddBacks, level) },
  );
}

/** Of the last tests, under the levels that were agreed since. */
export const lowestRoom = (borrower: DemoBorrower): number =>
  Math.min(
    ...borrower.covenants.flatMap(({ measure }) =>
      roomsOf(borrower, measure)
        .slice(-5)
        .map(({ room }) => room),
    ),
  );
