/** One quarter end's score out of the blocks, and what each block adds to it. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { unexplainedAccruals } from './accrualModel.ts';
import { BLOCKS } from './blocks.ts';
import { comparedFigures, figuresOf, revenueGrowth } from './comparedFigures.ts';
import { comparisonQuarterEnd } from './comparisonQuarterEnd.ts';
import type { CrossSection, QuarterCrossSection } from './crossSection.ts';
import type { PeerInputs } from './peerFigures.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import type { EarningsAtRisk, QualityBlock, QuarterScore } from './score.ts';
import { otherFirms, standingIn } from './standing.ts';

/**
 * The weighted mean of the risks that are there, turned round: 100 is well supported. Null below the least coverage.
 *
 * `coverage` is the weight that is there, of 100. Source: methods.md B6.
 *
 * @example compositeScore([{ weight: 35, risk: 0.5 }, { weight: 40, risk: 0.5 }]) // => { coverage: 75, score: 50 }
 */
export function compositeScore(blocks: readonly Pick<QualityBlock, 'weight' | 'risk'>[]): {
  readonly coverage: number;
  readonly score: number | null;
} {
  const coverage = availableWeight(blocks);
  if (coverage < QUALITY_TABLE.fewestCoverage) return { coverage, score: null };
  return { coverage, score: blocks.reduce((sum, block) => sum + pointsOf(block, coverage), 0) };
}

/**
 * What a block adds to the score: the points of all blocks sum to it.
 *
 * @example pointsOf({ weight: 35, risk: 0.2 }, 70) // => 40
 */
export const pointsOf = (block: Pick<QualityBlock, 'weight' | 'risk'>, coverage: number): number =>
  block.risk === null ? 0 : (100 * block.weight * (1 - block.risk)) / coverage;

const availableWeight = (blocks: readonly Pick<QualityBlock, 'weight' | 'risk'>[]): number =>
  blocks.reduce((sum, block) => sum + (block.risk === null ? 0 : block.weight), 0);

/**
 * The score of one borrower at one quarter end among the peers as stored, itself left out. No score has its reason.
 *
 * Source: methods.md B6 and A2 (accounts that do not tie are not scored).
 *
 * @example scoreQuarter(peer, crossSection).sectorPeers // => 11
 * @example scoreQuarter({ ...peer, ties: false }, crossSection).noScoreReason // => 'The accounts do not tie, so they are not scored.'
 */
export function scoreQuarter(peer: PeerInputs, crossSection: CrossSection): QuarterScore {
  const section = sectionOf(crossSection, peer.quarterEnd);
  const refused = refusal(peer, section);
  if (refused !== null || !section) return unscored(peer, section, refused ?? 'no peers');
  const unexplained = unexplainedAccruals(section.accrualModel, peer);
  const compared = comparedFigures(peer, unexplained);
  const blocks = BLOCKS.map((assess) =>
    assess({
      peer,
      compared,
      standing: (figure) => {
        const value = compared[figure];
        return value === null ? null : standingIn(section, peer, figure, value);
      },
    }),
  );
  const { coverage, score } = compositeScore(blocks);
  return {
    ...unscored(peer, section, ''),
    score,
    noScoreReason: score === null ? thinCoverage(coverage, blocks) : null,
    coverage: peer.derivedCashFlow ? Math.min(coverage, QUALITY_TABLE.mostCoverageDerived) : coverage,
    blocks,
    earningsAtRisk: earningsAtRisk(peer, unexplained),
  };
}

/**
 * What of twelve months' earnings rests on accruals, in the borrower's currency: what the peers do not explain, and
 * the rise of working capital beyond what growth takes. Nothing is ever given back for accruals below the peers'.
 * Null where either cannot be given.
 *
 * Source: methods.md B7.
 *
 * @example earningsAtRisk({ ...peer, figures: { assetsPrior: 200, workingCapitalAccruals: 9, nwcPrior: 50, revenue: 110, revenuePrior: 100 } }, 0.03) // => { unexplained: 6, workingCapital: 4 }
 */
function earningsAtRisk(peer: PeerInputs, unexplained: number | null): EarningsAtRisk | null {
  const given = figuresOf(peer.figures, ['assetsPrior', 'workingCapitalAccruals', 'nwcPrior']);
  const growth = revenueGrowth(peer.figures);
  if (!given || growth === null || unexplained === null) return null;
  return {
    unexplained: Math.max(0, unexplained) * given.assetsPrior,
    workingCapital: Math.max(0, given.workingCapitalAccruals - given.nwcPrior * growth),
  };
}

/**
 * The peers' standing that a quarter end is compared at; null where nobody's accounts of it are in the book.
 *
 * @example sectionOf(crossSection, '2026-09-30')?.firms // => 12
 */
export function sectionOf(crossSection: CrossSection, quarterEnd: PlainDate): QuarterCrossSection | null {
  const comparedAt = comparisonQuarterEnd(quarterEnd);
  return crossSection.quarters.find((quarter) => quarter.quarterEnd === comparedAt) ?? null;
}

function refusal(peer: PeerInputs, section: QuarterCrossSection | null): string | null {
  if (!peer.ties) return 'The accounts do not tie, so they are not scored.';
  return section ? null : 'No other accounts of this quarter end are in the book as of last night.';
}

function unscored(
  peer: PeerInputs,
  section: QuarterCrossSection | null,
  noScoreReason: string,
): QuarterScore {
  const others = section ? otherFirms(section, peer) : { sectorPeers: 0, bookPeers: 0 };
  return {
    quarterEnd: peer.quarterEnd,
    score: null,
    noScoreReason,
    coverage: 0,
    blocks: [],
    ...others,
    sectorWeight: Math.min(1, others.sectorPeers / QUALITY_TABLE.peers.fullSectorPeers),
    derivedCashFlow: peer.derivedCashFlow,
    earningsAtRisk: null,
  };
}

function thinCoverage(coverage: number, blocks: readonly QualityBlock[]): string {
  const absent = blocks.flatMap(({ name, reason }) => (reason === null ? [] : [`${name} (${reason})`]));
  return `Only ${coverage} of 100 points of weight are available and ${QUALITY_TABLE.fewestCoverage} are needed. Not available: ${absent.join('; ')}.`;
}
