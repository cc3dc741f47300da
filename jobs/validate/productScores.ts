/** The product's own way from statements to score and headline, for every firm of a simulated book. */
import { buildCrossSection } from '#core/quality/crossSection.ts';
import { headlineOf } from '#core/quality/headline.ts';
import type { PeerInputs } from '#core/quality/peerFigures.ts';
import { peerInputsOfQuarters } from '#core/quality/peerInputs.ts';
import { QUALITY_TABLE } from '#core/quality/qualityTable.ts';
import { scoreQuarter } from '#core/quality/quarterScore.ts';
import type { QuarterScore } from '#core/quality/score.ts';
import { AS_OF, borrowerInputs, quarterEndAt } from './borrowerInputs.ts';
import { LAST } from './firmPlan.ts';
import { ownMeasures } from './ownMeasures.ts';
import type { Firm } from './statementBook.ts';

export interface ProductScore {
  /** Of the last quarter end. */
  readonly peer: PeerInputs;
  readonly latest: QuarterScore;
  readonly headline: number | null;
  /** The headline of a quarter before, for how much it moves. */
  readonly headlineBefore: number | null;
  /** The last quarters' scores, oldest first. */
  readonly scores: readonly (number | null)[];
}

const QUARTER_ENDS = QUALITY_TABLE.headlineQuarters + 1;

/** One score per firm, in their order. */
export function productScores(firms: readonly Firm[]): readonly ProductScore[] {
  const peers = firms.map(peersOf);
  const crossSection = buildCrossSection(peers.flat(), 1);
  return peers.map((own) => {
    const scored = own.map((peer) => scoreQuarter(peer, crossSection));
    const scores = scored.map(({ score }) => score);
    return {
      peer: own.at(-1)!,
      latest: scored.at(-1)!,
      headline: headlineOf(scores).headline,
      headlineBefore: headlineOf(scores.slice(0, -1)).headline,
      scores,
    };
  });
}

function peersOf(firm: Firm): readonly PeerInputs[] {
  const peers = peerInputsOfQuarters(borrowerInputs(firm), AS_OF).slice(-QUARTER_ENDS);
  return peers.map((peer, k) => {
    const quarter = LAST - (peers.length - 1 - k);
    if (peer.quarterEnd !== quarterEndAt(quarter)) throw new Error(`no figures of quarter ${quarter}`);
    return withPublished(peer, firm, quarter);
  });
}

/** Screens and noise, where the product's own path gives none. */
function withPublished(peer: PeerInputs, { quarters }: Firm, quarter: number): PeerInputs {
  const measured = ownMeasures(quarters, quarter);
  const given = {
    mScore: measured['M-score, eight variables'],
    fScore: measured['F-score'],
    accrualNoise: measured['accrual noise (Dechow and Dichev)'],
  };
  const known = Object.fromEntries(Object.entries(given).filter(([, value]) => typeof value === 'number'));
  return { ...peer, figures: { ...known, ...peer.figures } };
}
