import { nearLineFacts, formatProbability, nearLineSentence } from '../patterns/patternWording.ts';
import { fdrAfterShortfall, type NearLineFigures } from '../patterns/nearLine.ts';
import { decimal } from '../money/decimal.ts';
import { formatShare } from '../money/print.ts';
import type { AlertRule } from './rule.ts';

/**
 * A covenant on the published list of its type: more of its tests just inside the limit than a smooth headroom
 * implies, in a book whose own test of the type rejects. Nothing stronger than "pattern" is said, and nothing of why.
 *
 * Source: methods.md Part C 5.4.
 *
 * @example pattern(nightOf({ ebitda: 12, debt: 47.5, cash: 6 })) // => []
 */
export const pattern: AlertRule = ({ inputs, nearLine }) =>
  inputs.covenants.flatMap((covenant) => {
    const figures = nearLine.find(({ covenantId }) => covenantId === covenant.id)?.figures;
    if (!figures?.isPublished) return [];
    return [
      {
        kind: 'pattern',
        covenantId: covenant.id,
        severity: 'soon',
        factDate: figures.latestNear,
        sentence: `${covenant.name}: ${nearLineSentence(figures)}.`,
        wouldChange: wouldChange(figures),
        evidence: [
          { label: 'Covenant', value: `${covenant.name}, clause ${covenant.clause}` },
          ...nearLineFacts(figures),
        ],
      },
    ];
  });

function wouldChange(figures: NearLineFigures): string {
  const { window, localFdr } = figures;
  const share = (value: number): string => formatShare(decimal(value), { places: 0 });
  const after = formatProbability(fdrAfterShortfall(figures));
  return `One test that ends up to ${share(window.gap)} of the level on the failing side would take the local false-discovery rate from ${formatProbability(localFdr)} to ${after}. Results further away than that, or more than ${share(window.band)} on the passing side, leave it as it is.`;
}
