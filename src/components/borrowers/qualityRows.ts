/** What a block's figures come to in rows: now, a year ago, and the peers' middle with how many they are. */
import type { MethodTopic } from '../../contracts/methodTopics.ts';
import type { QualityBlock, QualityBlockName } from '../../core/quality/score.ts';
import { borrowers, percent, signedPercent, signedPoints, wholeDays } from '../../core/quality/wording.ts';
import { plainScore } from './plainScore.ts';

export const BLOCK_TOPICS: Readonly<Record<QualityBlockName, MethodTopic>> = {
  'unexplained accruals': 'unexplained-accruals',
  'sharpest stretch': 'sharpest-stretch',
  'cash conversion': 'cash-conversion',
  'published screens': 'published-screens',
  'accrual noise': 'accrual-noise',
};

export interface QualityRow {
  readonly label: string;
  readonly now: string;
  readonly yearAgo: string;
  readonly peers: string;
  /** Where the borrower stands among them, 0 to 100; empty where it is not ranked. */
  readonly standing: string;
}

interface Figure {
  readonly label: string;
  readonly name: string;
  readonly print: (value: number) => string;
  readonly yearAgo?: string;
}

const points = (share: number): string => percent(share, 1);

const FIGURES: readonly Figure[] = [
  { label: 'Unexplained accruals, of assets', name: 'unexplainedShare', print: points },
  { label: 'Receivable days', name: 'receivableDays', print: wholeDays, yearAgo: 'receivableDaysYearAgo' },
  { label: 'Change of receivable days', name: 'receivableDaysChange', print: signedPercent },
  { label: 'Inventory days', name: 'inventoryDays', print: wholeDays, yearAgo: 'inventoryDaysYearAgo' },
  { label: 'Change of inventory days', name: 'inventoryDaysChange', print: signedPercent },
  {
    label: 'Capitalised costs, of revenue',
    name: 'capitalisedShare',
    print: points,
    yearAgo: 'capitalisedShareYearAgo',
  },
  { label: 'Change of capitalised costs', name: 'capitalisedShareChange', print: signedPoints },
  { label: 'Conversion after allowing for growth', name: 'conversion', print: percent },
  { label: 'Conversion, plain', name: 'conversionPlain', print: percent },
  { label: 'M-score', name: 'mScore', print: plainScore },
  { label: 'F-score', name: 'fScore', print: plainScore },
  { label: 'Accrual noise, of assets', name: 'accrualNoise', print: points },
];

/** One row a figure that the block has, in the order of the table above. */
export const rowsOf = ({ figures }: QualityBlock): readonly QualityRow[] =>
  FIGURES.flatMap(({ label, name, print, yearAgo }) => {
    const now = figures[name];
    if (now === undefined) return [];
    const before = yearAgo === undefined ? undefined : figures[yearAgo];
    const median = figures[`${name}PeerMedian`];
    const count = figures[`${name}Peers`];
    const percentile = figures[`${name}Percentile`];
    const variables = name === 'mScore' && figures.mScoreVariables === 5 ? ', five variables' : '';
    return [
      {
        label: `${label}${variables}`,
        now: print(now),
        yearAgo: before === undefined ? '' : print(before),
        peers:
          median === undefined
            ? ''
            : count === undefined
              ? print(median)
              : `${print(median)} (${borrowers(count, figures[`${name}MedianOfBook`] === 1)})`,
        standing: percentile === undefined ? '' : String(Math.round(100 * percentile)),
      },
    ];
  });
