import { FEWEST_NEAR, type NearLineEvidence } from './nearLineEvidence.ts';

/** The strongest thing that the book's statistics may be said to show. */
export const BOOK_SENTENCE = 'More tests just inside the line than a smooth pattern implies.';
/** Stands with every figure of debt to EBITDA. Source: Bordeman & Demerjian (2022, Journal of Accounting Research 60). */
export const LEVERAGE_SENTENCE =
  'Published work finds no support for bunching in debt-to-EBITDA covenants on average.';
export const LOW_POWER_SENTENCE =
  'Low power: with fewer than 1,000 tests even a real pattern mostly stays unseen.';
export const NOT_ENOUGH_NEAR = 'not enough tests near the line';

/**
 * What is said of one covenant: an observation and what a smooth headroom would give, no cause.
 *
 * @example nearLineSentence({ near: 6, passing: 5, expectedPassing: 2.1 }) // => '5 of 6 tests that ended near the limit are on the passing side; about 2.1 would be expected'
 * @example nearLineSentence({ near: 2, passing: 2, expectedPassing: 0.7 }) // => 'not enough tests near the line'
 */
export const nearLineSentence = ({
  near,
  passing,
  expectedPassing,
}: Pick<NearLineEvidence, 'near' | 'passing' | 'expectedPassing'>): string =>
  near < FEWEST_NEAR
    ? NOT_ENOUGH_NEAR
    : `${passing} of ${near} tests that ended near the limit are on the passing side; about ${expectedPassing.toFixed(1)} would be expected`;
