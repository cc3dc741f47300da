/** A simulated book of covenant tests: how near each ended to its limit, and which of them were lifted over it. */
import { addMonthsToMonthEnd, plainDate } from '#core/calendar/plainDate.ts';
import type { HeadroomRow } from '#core/patterns/headroomRow.ts';
import { drawsOf, type Draws } from './draws.ts';

/** One kind of book; methods.md C5. */
export interface HeadroomCell {
  readonly headroom: 'tight' | 'normal';
  readonly tests: number;
  /** Chance that a lifter lifts a shortfall that is small enough; nought for a book without lifting. */
  readonly lifting: number;
  /** Share of honest borrowers that steer the business to a small cushion. */
  readonly cushionSeekers: number;
}

export interface TestedBorrower {
  readonly borrowerId: number;
  readonly role: 'lifter' | 'cushion seeker' | 'other';
  readonly rows: readonly HeadroomRow[];
  /** Tests that were lifted over the limit, the removed first one left out. */
  readonly lifted: number;
}

export const BORROWERS = 500;
const LIFTERS = 0.2;
const SECTORS = 10;
const MEANS = {
  normal: { mean: 0.18, deviation: 0.15 },
  tight: { mean: 0.08, deviation: 0.08 },
} as const;
const SPREAD = { median: 0.1, logDeviation: 0.4 };
const PERSISTENCE = 0.75;
const LARGEST_SEASON = 0.5;
const STEP_DOWN = { chance: 0.3, by: 0.1 };
/** Shortfalls that can be lifted, and where they are lifted to. */
const LIFTABLE = 0.05;
const LIFTED_TO = 0.012;
const CUSHION = { mean: 0.03, spread: 0.025 };
const LEVEL = 3.5;

const FIRST_TEST = plainDate('2019-03-31');

export function headroomBook(seed: number, place: number, cell: HeadroomCell): readonly TestedBorrower[] {
  const roles = rolesOf(cell, drawsOf(seed, place * 1_000));
  return roles.map((role, k) => testedBorrower(k + 1, role, cell, drawsOf(seed, place * 1_000 + k + 1)));
}

function rolesOf(cell: HeadroomCell, draws: Draws): readonly TestedBorrower['role'][] {
  const lifters = cell.lifting > 0 ? LIFTERS * BORROWERS : 0;
  const seekers = cell.cushionSeekers * BORROWERS;
  return draws.shuffled(
    Array.from({ length: BORROWERS }, (_, k) =>
      k < lifters ? 'lifter' : k < lifters + seekers ? 'cushion seeker' : 'other',
    ),
  );
}

function testedBorrower(
  borrowerId: number,
  role: TestedBorrower['role'],
  cell: HeadroomCell,
  draws: Draws,
): TestedBorrower {
  const plain = role === 'cushion seeker' ? cushionHeadrooms(cell, draws) : ordinaryHeadrooms(cell, draws);
  const headrooms = plain.map((headroom) => {
    const isLifted = role === 'lifter' && headroom < 0 && headroom > -LIFTABLE && draws.chance(cell.lifting);
    return { headroom: isLifted ? Math.abs(draws.normal(0, LIFTED_TO)) : headroom, isLifted };
  });
  return {
    borrowerId,
    role,
    rows: rowsOf(
      borrowerId,
      headrooms.map(({ headroom }) => headroom),
    ),
    lifted: headrooms.slice(1).filter(({ isLifted }) => isLifted).length,
  };
}

function ordinaryHeadrooms({ headroom, tests }: HeadroomCell, draws: Draws): readonly number[] {
  const mean = draws.normal(MEANS[headroom].mean, MEANS[headroom].deviation);
  const spread = SPREAD.median * Math.exp(draws.normal(0, SPREAD.logDeviation));
  const season = spread * draws.between(0, LARGEST_SEASON);
  const peak = draws.whole(0, 3);
  const stepDownAt = draws.chance(STEP_DOWN.chance) ? draws.whole(1, tests - 1) : tests;
  return moving(tests, draws).map(
    (state, test) =>
      mean +
      spread * state +
      season * Math.cos((Math.PI / 2) * (test - peak)) -
      (test >= stepDownAt ? STEP_DOWN.by : 0),
  );
}

const cushionHeadrooms = ({ tests }: HeadroomCell, draws: Draws): readonly number[] =>
  moving(tests, draws).map((state) => CUSHION.mean + CUSHION.spread * state);

/** Variance one in the long run, heavy-tailed from quarter to quarter. */
function moving(tests: number, draws: Draws): readonly number[] {
  let state = draws.normal(0, 1);
  return Array.from({ length: tests }, () => {
    state = PERSISTENCE * state + Math.sqrt(1 - PERSISTENCE ** 2) * draws.studentT5();
    return state;
  });
}

function rowsOf(borrowerId: number, headrooms: readonly number[]): readonly HeadroomRow[] {
  let metBefore = 0;
  return headrooms.map((headroom, test) => {
    const row: HeadroomRow = {
      borrowerId,
      covenantId: borrowerId,
      measure: 'net-leverage',
      sector: `sector ${borrowerId % SECTORS}`,
      testDate: addMonthsToMonthEnd(FIRST_TEST, 3 * test),
      headroom,
      distance: headroom * LEVEL,
      tested: LEVEL * (1 - headroom),
      metBefore,
      removal: test === 0 ? 'first test' : null,
      ratioStep: null,
    };
    metBefore = headroom >= 0 ? metBefore + 1 : 0;
    return row;
  });
}
