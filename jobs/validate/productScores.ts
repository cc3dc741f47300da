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
  if (peers.at(-1)?.quarterEnd !== quarterEndAt(LAST)) throw new Error('no figures of the last quarter');
  return peers;
}
