import type { PlainDate } from '../calendar/plainDate.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { hasResult } from '../covenants/latestLiveTest.ts';

/** k of the last n tests ended in the just-passing band: an observation, nothing about chance. */
export interface JustPassing {
  readonly covenantId: number;
  readonly inBand: number;
  readonly ofLast: number;
  /** Tests in a row, up to the latest, that ended in the band. */
  readonly run: number;
  readonly testDates: readonly PlainDate[];
}

/**
 * How many of a covenant's last tests ended just passing, and how many in a row up to the latest.
 *
 * `tests` are oldest first. Only tests with a result count: one that awaits figures or was not tested is no test.
 * `ofLast` is smaller than asked for where there are fewer.
 *
 * @example justPassingOf([{ ...test, justPassing: true }], 1, 6) // => { covenantId: 1, inBand: 1, ofLast: 1, run: 1, testDates: ['2026-09-30'] }
 */
export function justPassingOf(
  tests: readonly CovenantTest[],
  covenantId: number,
  ofLast: number,
): JustPassing {
  const withResult = tests.filter((test) => test.covenantId === covenantId && hasResult(test));
  const last = withResult.slice(-ofLast);
  const inBand = last.filter(({ justPassing }) => justPassing);
  const afterLastOutside = withResult.findLastIndex(({ justPassing }) => !justPassing) + 1;
  return {
    covenantId,
    inBand: inBand.length,
    ofLast: last.length,
    run: withResult.length - afterLastOutside,
    testDates: inBand.map(({ testDate }) => testDate),
  };
}
