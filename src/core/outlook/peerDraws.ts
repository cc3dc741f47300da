import type { Bound } from '../covenants/headroom.ts';

/** A tested ratio against the level that will be in force. */
export interface RatioAgainstLevel {
  readonly bound: Bound;
  /** Positive; null where the borrower has no such covenant or the ratio is unknown, which cannot be not met. */
  readonly ratio: number | null;
  readonly level: number;
}

/**
 * What a ratio became over the horizon, as a multiple of what it was. 'earnings gone' where earnings turned to zero or
 * below: the test would not be met.
 */
export type RatioChange = number | 'earnings gone';

/** A peer's changes of all ratios over one and the same stretch of time: their dependence is kept. */
export type PeerDraw = readonly RatioChange[];

export interface PeerDrawResult {
  /** Level over ratio (at most) or ratio over level (at least), per ratio: below 1 is not met; null without a ratio. */
  readonly slacks: readonly (number | null)[];
  readonly notMet: number;
  /** Share of the draws in which any test is not met; null without draws. */
  readonly share: number | null;
  readonly n: number;
  readonly method: 'peer draws, each once';
}

/**
 * In how many of the peers' changes would any of the tests not be met? Each draw counts once, which is the limit of
 * drawing with replacement and needs no random numbers.
 *
 * Source: methods.md Part C 2.2 c; Demerjian & Owens (2016, Journal of Accounting and Economics 61:433-447).
 *
 * @example peerDraws([{ bound: 'most', ratio: 3.2, level: 3.5 }], [[1], [1.2]]).share // => 0.5
 */
export function peerDraws(tests: readonly RatioAgainstLevel[], draws: readonly PeerDraw[]): PeerDrawResult {
  const slacks = tests.map((test) => slackOf(test));
  const isNotMet = (draw: PeerDraw): boolean =>
    tests.some(({ bound }, k) => {
      const slack = slacks[k] ?? null;
      return slack !== null && isNotMetAfter(bound, slack, draw[k]!);
    });
  const notMet = draws.filter(isNotMet).length;
  return {
    slacks,
    notMet,
    share: draws.length === 0 ? null : notMet / draws.length,
    n: draws.length,
    method: 'peer draws, each once',
  };
}

/**
 * Level over ratio for a most, ratio over level for a least.
 *
 * @example slackOf({ bound: 'most', ratio: 3.2, level: 3.5 }) // => 1.09375
 */
export function slackOf({ bound, ratio, level }: RatioAgainstLevel): number | null {
  if (ratio === null) return null;
  return bound === 'most' ? level / ratio : ratio / level;
}

/**
 * Whether a test with this slack is not met after the change. A ratio that turns to nought or below with positive
 * earnings is net cash: a most is met by it, a least is not.
 *
 * @example isNotMetAfter('most', 1.1, 1.1) // => false
 */
export function isNotMetAfter(bound: Bound, slack: number, change: RatioChange): boolean {
  if (change === 'earnings gone') return true;
  return bound === 'most' ? change > slack : slack * change < 1;
}
