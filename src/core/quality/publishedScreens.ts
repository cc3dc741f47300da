/** The two published screens as they stand beside the score: methods.md B1 items 6 and 7. */
import { brokenSeries } from './missingFigures.ts';
import type { PublishedContext } from './publishedContext.ts';
import type { Given, Measures } from './publishedMeasure.ts';
import { fScreen, mScreen, type MScreen, type Screened } from './screenScores.ts';

/**
 * M in both forms and F.
 *
 * @example 'missing' in screenMeasures({ peer, accounts: () => accounts })['f-score'] // => true
 */
export function screenMeasures({ peer, accounts }: Pick<PublishedContext, 'peer' | 'accounts'>): Measures {
  const broken = brokenSeries(peer);
  const f = fScreen(accounts());
  return {
    'm-score': broken === null ? mGiven(mScreen(accounts(), true)) : { missing: broken },
    'm-score-five': mGiven(mScreen(accounts(), false)),
    'f-score':
      'missing' in f
        ? f
        : {
            value: f.f,
            remarks: f.issueDerived ? ['whether money was raised is read off the balance sheets'] : [],
          },
  };
}

function mGiven(m: Screened<MScreen>): Given {
  if ('missing' in m) return m;
  const filled = m.filled
    .filter((name) => m.form === 'M8' || name !== 'sgai')
    .map((name) => name.toUpperCase());
  return {
    value: m.score,
    remarks: filled.length > 0 ? [`${filled.join(', ')} missing, taken as one`] : [],
  };
}
