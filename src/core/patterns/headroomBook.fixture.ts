/** Invented books of headroom series for tests: an even density, and borrowers with or without lifting. */
import { seededRandom } from '../statistics/seededRandom.ts';
import type { HeadroomRow } from './headroomRow.ts';

export const buildRow = (given: Partial<HeadroomRow> = {}): HeadroomRow => {
  const headroom = given.headroom === undefined ? 0.1 : given.headroom;
  return {
    borrowerId: 1,
    covenantId: 1,
    measure: 'net-leverage',
    sector: 'metal goods',
    testDate: '2026-09-30',
    headroom,
    distance: headroom === null ? null : headroom * 3.5,
    tested: headroom === null ? null : 3.5 * (1 - headroom),
    ratioStep: null,
    metBefore: 0,
    removal: null,
    ...given,
  };
};

/** `count` tests spread evenly over ±30 % of the level, one borrower each four. */
export const buildEvenBook = (count: number, given: Partial<HeadroomRow> = {}): readonly HeadroomRow[] =>
  Array.from({ length: count }, (_, k) =>
    buildRow({
      borrowerId: k >> 2,
      covenantId: k >> 2,
      headroom: -0.3 + (0.6 * (k + 0.5)) / count,
      ...given,
    }),
  );

export interface BookPlan {
  readonly seed: number;
  readonly borrowers: number;
  readonly quarters: number;
  /** Share of the borrowers that lift shortfalls of up to 5 % to just inside the limit, each with this chance. */
  readonly lifters: number;
  readonly lifting: number;
}

/** Headroom that returns to a borrower's own mean (persistence .75), as in the simulation behind the settings. */
export function buildBook({ seed, borrowers, quarters, lifters, lifting }: BookPlan): readonly HeadroomRow[] {
  const random = seededRandom(seed);
  const normal = () => Math.sqrt(-2 * Math.log(1 - random.share())) * Math.cos(2 * Math.PI * random.share());
  return Array.from({ length: borrowers }, (_, borrowerId) => {
    const mean = 0.08 + 0.08 * normal();
    const spread = 0.1 * Math.exp(0.4 * normal());
    const isLifter = borrowerId < lifters * borrowers;
    let state = normal();
    let metBefore = 0;
    return Array.from({ length: quarters }, () => {
      state = 0.75 * state + Math.sqrt(1 - 0.75 ** 2) * normal();
      const plain = mean + spread * state;
      const isLifted = isLifter && plain < 0 && plain > -0.05 && random.share() < lifting;
      const row = buildRow({
        borrowerId,
        covenantId: borrowerId,
        sector: `sector ${borrowerId % 4}`,
        headroom: isLifted ? Math.abs(0.012 * normal()) : plain,
        metBefore,
      });
      metBefore = row.headroom! >= 0 ? metBefore + 1 : 0;
      return row;
    });
  }).flat();
}
