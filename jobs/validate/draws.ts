/** Seeded draws of the simulated books: the same seed, the same book, on every machine. */
import { seededRandom } from '#core/statistics/seededRandom.ts';

export interface Draws {
  readonly between: (from: number, to: number) => number;
  /** Whole number, both ends in. */
  readonly whole: (from: number, to: number) => number;
  readonly chance: (probability: number) => boolean;
  readonly normal: (mean: number, deviation: number) => number;
  /** Heavier tails than the normal, variance one. */
  readonly studentT5: () => number;
  readonly shuffled: <Item>(items: readonly Item[]) => Item[];
}

/** A stream of its own for every place within a seed, so that a change of one firm moves no other. */
export function drawsOf(seed: number, place: number): Draws {
  const random = seededRandom(Math.imul(seed, 1_000_003) + place);
  const standardNormal = (): number =>
    Math.sqrt(-2 * Math.log(1 - random.share())) * Math.cos(2 * Math.PI * random.share());
  return {
    between: (from, to) => from + (to - from) * random.share(),
    whole: (from, to) => from + random.below(to - from + 1),
    chance: (probability) => random.share() < probability,
    normal: (mean, deviation) => mean + deviation * standardNormal(),
    studentT5: () => {
      const chiSquared = Array.from({ length: 5 }, () => standardNormal() ** 2).reduce((a, b) => a + b);
      // Student's t with 5 degrees of freedom has variance 5/3.
      return standardNormal() / Math.sqrt(chiSquared / 5) / Math.sqrt(5 / 3);
    },
    shuffled: (items) => {
      const order = [...items];
      for (let last = order.length - 1; last > 0; last -= 1) {
        const other = random.below(last + 1);
        [order[last], order[other]] = [order[other]!, order[last]!];
      }
      return order;
    },
  };
}

/** A series that returns to nought: keeps `persistence` of itself, with this deviation in the long run. */
export interface Returning {
  readonly persistence: number;
  readonly deviation: number;
}

export const nextOf = (before: number, { persistence, deviation }: Returning, draws: Draws): number =>
  persistence * before + draws.normal(0, deviation * Math.sqrt(1 - persistence ** 2));
