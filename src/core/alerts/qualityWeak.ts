import { formatDay } from '../calendar/printDay.ts';
import { decimal } from '../money/decimal.ts';
import { formatScore } from '../money/print.ts';
import type { AlertFinding } from './alert.ts';
import type { AlertRule } from './rule.ts';

/**
 * The headline is under the policy's line: soon. One quarter end under it: a note. Ask on one, act on the headline.
 *
 * @example qualityWeak({ ...nightOf({ ebitda: 12, debt: 45, cash: 6 }), quality: buildQuality({ headline: 28, latest: buildQuarterScore('2026-09-30', 31) }) })[0].sentence // => 'Reporting quality 28, below 30.'
 */
export const qualityWeak: AlertRule = ({ quality, policy }) => {
  const { headline, latest } = quality;
  const line = policy.qualityWeakBelow;
  if (!latest) return [];
  const score = (value: number): string => formatScore(decimal(value), { beside: decimal(line) });
  const found = (severity: 'soon' | 'note', sentence: string, value: number): AlertFinding => ({
    kind: 'reporting quality weak',
    covenantId: null,
    severity,
    factDate: latest.quarterEnd,
    sentence,
    wouldChange: `A score of ${line} or more instead of ${score(value)}.`,
    evidence: [
      { label: 'Headline', value: headline === null ? 'no score' : score(headline) },
      {
        label: `Quarter end ${formatDay(latest.quarterEnd)}`,
        value: latest.score === null ? 'no score' : score(latest.score),
      },
      ...quality.explanations.map((value) => ({ label: 'Why', value })),
      ...(quality.whatWouldChangeIt ? [{ label: 'To ask for', value: quality.whatWouldChangeIt }] : []),
    ],
  });
  const why = quality.explanations[0] ? ` ${quality.explanations[0]}` : '';
  if (headline !== null && headline < line)
    return [found('soon', `Reporting quality ${score(headline)}, below ${line}.${why}`, headline)];
  if (latest.score !== null && latest.score < line)
    return [
      found(
        'note',
        `Reporting quality ${score(latest.score)} at one quarter end, ${formatDay(latest.quarterEnd)}, below ${line}.${why}`,
        latest.score,
      ),
    ];
  return [];
};
