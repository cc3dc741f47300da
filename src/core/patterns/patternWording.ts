import { decimal } from '../money/decimal.ts';
import { formatShare } from '../money/print.ts';
import type { NearLineFigures } from './nearLine.ts';
import { FEWEST_NEAR, type NearLineEvidence } from './nearLineEvidence.ts';

/** The strongest thing that the book's statistics may be said to show. */
export const BOOK_SENTENCE = 'More tests just inside the line than a smooth pattern implies.';
/** Where they do not show it: too few tests to see a pattern is no evidence that there is none. */
export const NO_PATTERN_SENTENCE =
  'Not more tests just inside the line than a smooth pattern implies. That is no evidence that there are none.';
/** Stands with every figure of debt to EBITDA. Source: Bordeman & Demerjian (2022, Journal of Accounting Research 60). */
export const LEVERAGE_SENTENCE =
  'Published work finds no support for bunching in debt-to-EBITDA covenants on average.';
export const LOW_POWER_SENTENCE =
  'Low power: with fewer than 1,000 tests even a real pattern mostly stays unseen.';
export const NOT_ENOUGH_NEAR = 'not enough tests near the line';
/** Why results crowd at a limit with nobody steering the accounts. Desk practice, no source. */
export const INNOCENT_REASONS =
  'Ordinary reasons: covenants agreed tight; real steps that kept the borrower inside; failing tests that vanish because the level was reset before the test date; ratios rounded by the agreement; standard definitions in place of the agreement’s own.';

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

const DEBT_TO_EBITDA = ['total-leverage', 'senior-leverage', 'net-leverage'];

/**
 * Whether a measure, by its code, is debt to EBITDA, beside whose figures LEVERAGE_SENTENCE stands.
 *
 * @example isDebtToEbitda('net-leverage') // => true
 */
export const isDebtToEbitda = (measure: string): boolean => DEBT_TO_EBITDA.includes(measure);

/**
 * A probability as it is printed.
 *
 * @example formatProbability(0.0123) // => '0.012'
 * @example formatProbability(0.00004) // => 'below 0.001'
 * @example formatProbability(0.34) // => '0.34'
 */
export function formatProbability(value: number): string {
  if (value < 0.001) return 'below 0.001';
  return value < 0.1 ? value.toFixed(3) : value.toFixed(2);
}

/**
 * The facts behind the evidence of one covenant, label and value: the exact test, the local false-discovery rate with
 * its prior, with whom it was fitted, the settings, and the book's own test of the type.
 *
 * @example nearLineFacts({ near: 6, passing: 5, expectedPassing: 2, share: 1 / 3, pAtLeast: 0.018, localFdr: 0.4, priorShare: 0.04, peers: 'book', peerCount: 60, isPublished: false, latestNear: '2026-09-30', window: { band: 0.02, gap: 0.04 }, gateP: null }).length // => 5
 */
export function nearLineFacts(
  figures: NearLineFigures,
): readonly { readonly label: string; readonly value: string }[] {
  const { pAtLeast, localFdr, priorShare, peers, peerCount, window, gateP, isPublished } = figures;
  const share = (value: number): string => formatShare(decimal(value), { places: 0 });
  return [
    { label: 'Exact test, given how many ended near', value: `p ${formatProbability(pAtLeast)}` },
    {
      label: 'Local false-discovery rate',
      value: `${formatProbability(localFdr)}, prior ${formatProbability(1 - priorShare)}`,
    },
    {
      label: 'Fitted with',
      value: `${peerCount} covenants of the ${peers === 'sector' ? 'sector' : 'whole book'}`,
    },
    {
      label: 'Near the limit',
      value: `up to ${share(window.band)} of the level on the passing side, ${share(window.gap)} on the failing side`,
    },
    {
      label: 'The book’s own test of this type',
      value:
        gateP === null
          ? 'too few tests near the limit: no list'
          : `p ${formatProbability(gateP)}: ${listWords(gateP, isPublished)}`,
    },
  ];
}

const GATE_LEVEL = 0.05;

function listWords(gateP: number, isPublished: boolean): string {
  if (gateP > GATE_LEVEL) return 'no list is shown';
  return isPublished ? 'on the list' : 'not on the list';
}
