/** An invented book of ratios, for tests of what may come: seeded, the same seed gives the same book. */
import { addMonthsToMonthEnd } from '../calendar/plainDate.ts';
import { seededRandom } from '../statistics/seededRandom.ts';
import type { RatioSeries } from './ratioSeries.ts';

interface BookOfRatios {
  readonly borrowers: number;
  readonly quarters: number;
  readonly sectors?: number;
  /** Standard size of a quarter's change, in logs. */
  readonly swing?: number;
  readonly seed?: number;
}

/** Leverage at most 3.50x and cover at least 2.00x, the last test on 30 September 2026. */
export function bookOfRatios({
  borrowers,
  quarters,
  sectors = 2,
  swing = 0.2,
  seed = 1,
}: BookOfRatios): RatioSeries[] {
  const random = seededRandom(seed);
  return Array.from({ length: borrowers }, (_, k) => k + 1).flatMap((borrowerId) =>
    (['net-leverage', 'interest-cover'] as const).map((measure, place): RatioSeries => {
      let ratio = 2 + 2 * random.share();
      return {
        borrowerId,
        covenantId: 10 * borrowerId + place,
        sector: `sector ${borrowerId % sectors}`,
        measure,
        bound: measure === 'net-leverage' ? 'most' : 'least',
        points: Array.from({ length: quarters }, (_, quarter) => {
          ratio *= Math.exp(swing * (2 * random.share() - 1));
          const hasEarnings = random.share() > 0.03;
          return {
            testDate: addMonthsToMonthEnd('2026-09-30', 3 * (quarter - quarters + 1)),
            ratio: hasEarnings ? ratio : 0,
            hasEarnings,
            level: measure === 'net-leverage' ? 3.5 : 2,
            leverage: ratio,
          };
        }),
      };
    }),
  );
}
