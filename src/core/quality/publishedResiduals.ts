/** What the published models leave of a borrower's figures: methods.md B1 items 4 and 8. */
import { aggregateRealActivities } from '../accruals/realActivities.ts';
import { brokenSeries, missingFigures } from './missingFigures.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';
import type { PublishedContext } from './publishedContext.ts';
import type { Given, Measures } from './publishedMeasure.ts';
import { abnormalOf, type PublishedModel } from './publishedModels.ts';

const BASE: readonly PeerFigure[] = ['assetsPrior', 'revenue', 'revenuePrior'];
const NEEDS: Readonly<Record<PublishedModel, readonly PeerFigure[]>> = {
  jones: [...BASE, 'netIncome', 'cfo'],
  'modified-jones': [...BASE, 'netIncome', 'cfo', 'receivables', 'receivablesPrior'],
  kothari: [...BASE, 'netIncome', 'cfo', 'receivables', 'receivablesPrior', 'netIncomePrior'],
  'abnormal-cash-flow': [...BASE, 'cfo'],
  'abnormal-production': [...BASE, 'productionCosts', 'revenueBefore'],
  'abnormal-discretionary': [...BASE, 'discretionaryExpenses'],
};
const USES_CASH: readonly PublishedModel[] = ['jones', 'modified-jones', 'kothari', 'abnormal-cash-flow'];

/**
 * Residuals against the same sector and quarter end; the aggregate of real activities wants all three.
 *
 * @example 'missing' in modelMeasures({ peer, section: null }).jones // => true
 */
export function modelMeasures({ peer, section }: Pick<PublishedContext, 'peer' | 'section'>): Measures {
  const residual = (model: PublishedModel): Given => residualOf(peer, section, model);
  const [cashFlow, production, discretionary] = [
    residual('abnormal-cash-flow'),
    residual('abnormal-production'),
    residual('abnormal-discretionary'),
  ];
  return {
    jones: residual('jones'),
    'modified-jones': residual('modified-jones'),
    kothari: residual('kothari'),
    'abnormal-cash-flow': cashFlow,
    'abnormal-production': production,
    'abnormal-discretionary': discretionary,
    'real-activities':
      'value' in cashFlow && 'value' in production && 'value' in discretionary
        ? {
            value: aggregateRealActivities({
              cashFlow: cashFlow.value,
              production: production.value,
              discretionary: discretionary.value,
            }),
          }
        : { missing: 'not all three can be given' },
  };
}

function residualOf(peer: PeerInputs, section: PublishedContext['section'], model: PublishedModel): Given {
  const broken = USES_CASH.includes(model) ? brokenSeries(peer) : null;
  const gap = broken ?? missingFigures(peer, NEEDS[model]);
  if (gap !== null) return { missing: gap };
  const abnormal = abnormalOf(section?.published, peer, model);
  if ('missing' in abnormal) return abnormal;
  return {
    value: abnormal.value,
    remarks: [`fitted on ${abnormal.firms} borrowers of the sector, this one among them`],
  };
}
