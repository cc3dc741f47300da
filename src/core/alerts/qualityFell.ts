import type { PlainDate } from '../calendar/plainDate.ts';
import { monthsBefore } from '../calendar/fiscalYear.ts';
import { formatDay } from '../calendar/printDay.ts';
import { bandOf, headlineOf } from '../quality/headline.ts';
import { QUALITY_TABLE } from '../quality/qualityTable.ts';
import { QUALITY_BANDS, type QualityBand } from '../quality/score.ts';
import type { AlertContext, AlertRule } from './rule.ts';

interface Before {
  readonly quarterEnd: PlainDate;
  readonly headline: number;
  readonly band: QualityBand;
}

/**
 * The headline lies in a lower band than at the quarter end before, and at least the policy's points lower: soon.
 *
 * The quarter end before is the one that the last assessment spoke of, where it is an earlier one; else it is read
 * from the history, so that a night repeated finds the same.
 *
 * @example qualityFell(nightOf({ ebitda: 12, debt: 45, cash: 6 })) // => []
 */
export const qualityFell: AlertRule = (context) => {
  const { quality, policy } = context;
  const { headline, band, latest } = quality;
  const before = quarterBefore(context);
  if (headline === null || band === null || !latest || !before) return [];
  const points = before.headline - headline;
  if (rank(band) <= rank(before.band) || points < policy.qualityFell.points) return [];
  const line = QUALITY_TABLE.bands.find((each) => each.band === before.band)?.from ?? headline;
  return [
    {
      kind: 'reporting quality fell',
      covenantId: null,
      severity: 'soon',
      factDate: latest.quarterEnd,
      sentence: `Reporting quality ${rounded(before.headline)} to ${rounded(headline)}: ${before.band} to ${band}.${firstOf(quality.explanations)}`,
      wouldChange: `A headline of ${line} or more instead of ${rounded(headline)}.`,
      evidence: [
        { label: `On ${formatDay(before.quarterEnd)}`, value: `${rounded(before.headline)}, ${before.band}` },
        { label: `On ${formatDay(latest.quarterEnd)}`, value: `${rounded(headline)}, ${band}` },
        ...quality.explanations.map((value) => ({ label: 'Why', value })),
      ],
    },
  ];
};

function quarterBefore({ inputs, quality }: AlertContext): Before | null {
  const earlier = quality.history.slice(0, -1);
  const last = earlier.at(-1);
  const stored = inputs.previous?.quality;
  const storedBand = QUALITY_BANDS.find((band) => band === stored?.band);
  if (stored && stored.headline !== null && storedBand && stored.quarterEnd === last?.quarterEnd)
    return { quarterEnd: stored.quarterEnd, headline: stored.headline, band: storedBand };
  if (!last) return null;
  const from = monthsBefore(last.quarterEnd, (QUALITY_TABLE.headlineQuarters - 1) * 3);
  const recent = earlier.filter(({ quarterEnd }) => monthsBefore(quarterEnd, 0) >= from);
  const { headline } = headlineOf(recent.map(({ score }) => score));
  return headline === null ? null : { quarterEnd: last.quarterEnd, headline, band: bandOf(headline) };
}

/** 0 is the best band. */
const rank = (band: QualityBand): number => QUALITY_BANDS.indexOf(band);

const rounded = (score: number): string => score.toFixed(0);

const firstOf = (explanations: readonly string[]): string => (explanations[0] ? ` ${explanations[0]}` : '');
