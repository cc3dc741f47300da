import type { PlainDate } from '../calendar/plainDate.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import type { PeerFigure } from './peerFigures.ts';
import type { PublishedMeasure } from './publishedMeasure.ts';

export const QUALITY_BANDS = [
  'well supported',
  'broadly supported',
  'needs explanation',
  'weakly supported',
] as const;
export type QualityBand = (typeof QUALITY_BANDS)[number];

export const QUALITY_BLOCKS = [
  'unexplained accruals',
  'sharpest stretch',
  'cash conversion',
  'published screens',
  'accrual noise',
] as const;
export type QualityBlockName = (typeof QUALITY_BLOCKS)[number];

export interface QualityBlock {
  readonly name: QualityBlockName;
  readonly weight: number;
  /** 0 (no reason to ask) to 1; null where the block is not available, with the reason. */
  readonly risk: number | null;
  readonly reason: string | null;
  /** Raw figures behind the block, by name, for the method line ("receivableDays", "receivableDaysYearAgo", …). */
  readonly figures: Readonly<Record<string, number>>;
  readonly peers: number;
}

/** What of a year's earnings does not rest on cash as the peers' does, in whole units of the borrower's currency. */
export interface EarningsAtRisk {
  /** Unexplained accruals x assets a year ago; never below nought. */
  readonly unexplained: number;
  /** Working-capital accruals of twelve months less what growth takes; never below nought. */
  readonly workingCapital: number;
}

/** The score of one quarter end. */
export interface QuarterScore {
  readonly quarterEnd: PlainDate;
  readonly score: number | null;
  readonly noScoreReason: string | null;
  /** Weight available, 0 to 100. */
  readonly coverage: number;
  readonly blocks: readonly QualityBlock[];
  readonly sectorPeers: number;
  readonly bookPeers: number;
  /** Weight given to the sector in the peer percentiles, 0 to 1; the rest leans on the whole book. */
  readonly sectorWeight: number;
  readonly derivedCashFlow: boolean;
  /** Null where either part cannot be computed. */
  readonly earningsAtRisk: EarningsAtRisk | null;
}

/** A line of one statement. */
export interface SourceCell {
  readonly statementId: number;
  readonly line: LineItemCode;
  readonly periodEnd: PlainDate;
  /** 0 for a balance sheet. */
  readonly months: number;
}

/** One figure of the latest quarter end and the cells it was read from. */
export interface FigureSource {
  readonly figure: PeerFigure;
  /** Whole units of the borrower's currency, paid items positive; of screens their score. */
  readonly amount: number;
  readonly cells: readonly SourceCell[];
}

export const BESIDE_FACTS = [
  'add-backs',
  'days late',
  'restatements',
  'audited less management',
  'just passing',
  'receivable days over two years',
] as const;

/** What stands beside the score and is never inside it, one sentence with its figures. */
export interface BesideFact {
  readonly fact: (typeof BESIDE_FACTS)[number];
  readonly sentence: string;
}

export interface ReportingQuality {
  readonly headline: number | null;
  readonly band: QualityBand | null;
  /** One quarter end only. */
  readonly provisional: boolean;
  readonly noScoreReason: string | null;
  readonly latest: QuarterScore | null;
  /** Oldest first. */
  readonly history: readonly QuarterScore[];
  readonly explanations: readonly string[];
  readonly whatWouldChangeIt: string | null;
  /** Remarks that stand beside the number: unaudited, derived, does not tie, growing fast, few peers. */
  readonly remarks: readonly string[];
  /** Every published measure at the latest quarter end. */
  readonly published: readonly PublishedMeasure[];
  readonly beside: readonly BesideFact[];
  /** What the latest quarter end's figures were read from. */
  readonly sources: readonly FigureSource[];
}
