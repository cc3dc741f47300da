/** Why the score is what it is: the largest contributions as sentences with both values and the number of peers. */
import { revenueGrowth } from './comparedFigures.ts';
import { missingFigures } from './missingFigures.ts';
import type { PeerInputs } from './peerFigures.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import type { QualityBlock, QuarterScore } from './score.ts';
import { STRETCH_CHANNELS, type StretchChannel } from './stretch.ts';
import { borrowers, percent, rose, signedPercent, signedPoints, wholeDays } from './wording.ts';

interface Explanation {
  /** Weight x (risk - 0.5): above nought it draws the score down. */
  readonly contribution: number;
  readonly line: string;
  /** What to ask for that could change it. */
  readonly question: string;
}

export interface Explanations {
  readonly lines: readonly string[];
  readonly whatWouldChangeIt: string | null;
}

/**
 * At most four lines, the largest contribution first; only what draws the score down is explained. Source:
 * methods.md B6.
 *
 * @example explain(quarterScore, peer).lines.length <= 4 // => true
 */
export function explain(latest: QuarterScore, peer: PeerInputs): Explanations {
  if (latest.score === null) return { lines: [], whatWouldChangeIt: whatWouldAllowAScore(peer) };
  const explanations = latest.blocks
    .flatMap(explanationsOf)
    .filter(({ contribution }) => contribution > 0)
    .sort((a, b) => b.contribution - a.contribution);
  const growth = growthLine(peer);
  const most = QUALITY_TABLE.explanationLines - (growth === null ? 0 : 1);
  return {
    lines: [...explanations.slice(0, most).map(({ line }) => line), ...(growth === null ? [] : [growth])],
    whatWouldChangeIt: explanations[0]?.question ?? null,
  };
}

/** Growth never draws the score down by itself, but nobody may read the score of a fast grower without it. */
function growthLine({ figures }: PeerInputs): string | null {
  const growth = revenueGrowth(figures);
  return growth !== null && growth > QUALITY_TABLE.fastGrowth
    ? `Revenue grew ${percent(growth)}: screens built on growth are left out.`
    : null;
}

function whatWouldAllowAScore(peer: PeerInputs): string {
  if (!peer.ties) return 'Ask for corrected accounts that tie.';
  if (peer.cashFlowPresentationChanged)
    return 'Ask for the year before under the same presentation of cash flows.';
  const missing = missingFigures(peer, [
    'assetsPrior',
    'netIncome',
    'cfo',
    'capex',
    'revenue',
    'revenuePrior',
    'receivables',
    'receivablesPrior',
  ]);
  return missing === null
    ? 'It can be scored when more borrowers of the same quarter end are in the book.'
    : `Ask for what is ${missing}.`;
}

function explanationsOf(block: QualityBlock): readonly Explanation[] {
  if (block.risk === null) return [];
  const contribution = block.weight * (block.risk - 0.5);
  switch (block.name) {
    case 'unexplained accruals':
      return [
        {
          contribution,
          line: unexplainedLine(block),
          question:
            'Ask for the bridge from net income to cash and for the entries behind the largest accruals.',
        },
      ];
    case 'sharpest stretch':
      return STRETCH_CHANNELS.flatMap((channel) => stretchExplanation(block, channel) ?? []);
    case 'cash conversion':
      return [
        {
          contribution,
          line: conversionLine(block),
          question: 'Ask for the bridge from EBITDA to cash from operations, item by item.',
        },
      ];
    case 'published screens':
      return [
        {
          contribution,
          line: `Published screens: M-score ${figure(block, 'mScore').toFixed(2).replace('-', '−')}, F-score ${figure(block, 'fScore').toFixed(2)}.`,
          question: 'Ask what lies behind the largest term of the two published screens.',
        },
      ];
    case 'accrual noise':
      return [
        {
          contribution,
          line: `Working-capital accruals follow cash within ${percent(figure(block, 'accrualNoise'), 1)} of assets; ${middle(block, 'accrualNoise', (value) => percent(value, 1))}.`,
          question: 'Ask how estimates at quarter ends are made and how far they were out.',
        },
      ];
  }
}

const unexplainedLine = (block: QualityBlock): string =>
  `Accruals not explained by cash or growth are ${percent(figure(block, 'unexplainedShare'))} of assets; the peer median is ${percent(figure(block, 'unexplainedSharePeerMedian'))} (${comparison(block, 'unexplainedShare')}).`;

const conversionLine = (block: QualityBlock): string =>
  `EBITDA turned into cash: ${percent(figure(block, 'conversion'))} after allowing for growth; ${middle(block, 'conversion', percent)}.`;

const CHANNELS: Readonly<
  Record<StretchChannel, { readonly line: (block: QualityBlock) => string; readonly question: string }>
> = {
  receivables: {
    line: (block) => daysLine(block, 'Receivable days', 'receivableDays'),
    question: 'Ask for the receivables ageing and the credit notes after the quarter end.',
  },
  inventory: {
    line: (block) => daysLine(block, 'Inventory days', 'inventoryDays'),
    question: 'Ask for the inventory by age and the last count.',
  },
  capitalised: {
    line: (block) => {
      const [before, now] = [figure(block, 'capitalisedShareYearAgo'), figure(block, 'capitalisedShare')];
      return `Capitalised costs ${rose(now - before)} from ${percent(before, 1)} to ${percent(now, 1)} of revenue; ${middle(block, 'capitalisedShareChange', signedPoints)}.`;
    },
    question: 'Ask for the list of capitalised projects with the costs moved in the year.',
  },
};

/** A channel counts by its own risk to the power that the block's sharpest one is taken to. */
function stretchExplanation(block: QualityBlock, channel: StretchChannel): Explanation | null {
  const risk = block.figures[`${channel}Risk`];
  if (risk === undefined) return null;
  const { line, question } = CHANNELS[channel];
  return {
    contribution: block.weight * (risk ** figure(block, 'channels') - 0.5),
    line: line(block),
    question,
  };
}

function daysLine(block: QualityBlock, label: string, name: 'receivableDays' | 'inventoryDays'): string {
  const change = figure(block, `${name}Change`);
  return `${label} ${rose(change)} from ${wholeDays(figure(block, `${name}YearAgo`))} to ${wholeDays(figure(block, name))} (${signedPercent(change)}); ${middle(block, `${name}Change`, signedPercent)}.`;
}

const middle = (block: QualityBlock, name: string, print: (value: number) => string): string =>
  `peers ${print(figure(block, `${name}PeerMedian`))} (${comparison(block, name)})`;

const comparison = (block: QualityBlock, name: string): string =>
  borrowers(figure(block, `${name}Peers`), figure(block, `${name}MedianOfBook`) === 1);

function figure(block: QualityBlock, name: string): number {
  const value = block.figures[name];
  if (value === undefined) throw new Error(`${block.name} has a risk but no ${name}`);
  return value;
}
