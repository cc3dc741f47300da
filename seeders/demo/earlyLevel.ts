/** Levels that were agreed tight at first: what a book looks like before lenders and borrowers know each other. */
import type { LevelKind } from './levelSchedule.ts';
import { levelWithRoom } from './levelSchedule.ts';
import { randomNumbers } from './randomNumbers.ts';

/** Of ordinary covenants. */
const TIGHT_SHARE = 0.5;
/** Room that the least of the early tests was left, as a share of the level; some were not met. */
const ROOM = { from: -0.05, to: 0.06 } as const;
/** Five steps of the schedule's own rounding. */
const FINER = 5;

interface EarlyTests {
  /** Tells one covenant from another, so that the book comes out alike wherever it is laid out. */
  readonly seed: string;
  readonly values: readonly number[];
}

/** The tight level of a covenant's first years; null where it was agreed with room from the start. */
export function tightEarlyLevel({ seed, values }: EarlyTests, kind: LevelKind): number | null {
  const random = randomNumbers(`early level ${seed}`);
  if (values.length < 2 || random.share() >= TIGHT_SHARE) return null;
  return levelWithRoom(values, random.between(ROOM.from, ROOM.to), { ...kind, step: kind.step / FINER });
}
