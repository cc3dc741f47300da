/** What the last night says of one borrower's covenants near their limits. */
import type { Covenant } from '../covenants/covenant.ts';
import type { NearLine } from './headroomGrid.ts';
import { nearLineEvidence } from './nearLineEvidence.ts';
import { posterior } from './nearLineRanking.ts';
import type { NearLineStanding, PatternStanding } from './patternStanding.ts';

export interface NearLineFigures extends Omit<NearLineStanding, 'borrowerId' | 'covenantId' | 'measure'> {
  /** Share of the type's covenants that the fit takes for lifting before looking at one. */
  readonly priorShare: number;
  readonly window: NearLine;
  /** Holm's p-value of the book's own test of the type; null where it has too few tests near the limit. */
  readonly gateP: number | null;
}

export interface CovenantNearLine {
  readonly covenantId: number;
  /** Null below three tests near the line: nothing can be said. */
  readonly figures: NearLineFigures | null;
}

/**
 * Each covenant of an agreement with its evidence; none before the first night, and none for the desk's own triggers,
 * which no borrower promised.
 *
 * @example nearLinesOf([covenant], null) // => []
 * @example nearLinesOf([covenant], { window: { band: 0.02, gap: 0.04 }, gates: [], refused: [], types: [], nearLine: [] }) // => [{ covenantId: 1, figures: null }]
 */
export function nearLinesOf(
  covenants: readonly Pick<Covenant, 'id' | 'measure' | 'isOurs'>[],
  standing: PatternStanding | null,
): readonly CovenantNearLine[] {
  if (standing === null) return [];
  return covenants
    .filter(({ isOurs }) => !isOurs)
    .map(({ id }) => {
      const own = byCovenant(standing).get(id);
      return { covenantId: id, figures: own ? figuresOf(own, standing) : null };
    });
}

const BY_COVENANT = new WeakMap<PatternStanding, ReadonlyMap<number, NearLineStanding>>();

/** Laid out once for the whole book: every borrower of a night asks the same standing. */
function byCovenant(standing: PatternStanding): ReadonlyMap<number, NearLineStanding> {
  const known = BY_COVENANT.get(standing);
  if (known) return known;
  const laidOut = new Map(standing.nearLine.map((each) => [each.covenantId, each]));
  BY_COVENANT.set(standing, laidOut);
  return laidOut;
}

function figuresOf(
  { borrowerId: _borrowerId, covenantId: _covenantId, measure, ...figures }: NearLineStanding,
  { types, gates, window }: PatternStanding,
): NearLineFigures {
  const type = types.find((each) => each.measure === measure);
  if (!type) throw new Error(`evidence of ${measure} without its type`);
  const gate = gates.find((each) => each.measure === measure);
  return { ...figures, priorShare: type.priorShare, window, gateP: gate?.adjusted ?? null };
}

/**
 * The local false-discovery rate that one more test just on the failing side would lead to: what would change a
 * pattern, as a number.
 *
 * @example fdrAfterShortfall({ near: 4, passing: 4, share: 1 / 3, priorShare: 0.1 }) > 0.1 // => true
 */
export function fdrAfterShortfall({
  near,
  passing,
  share,
  priorShare,
}: Pick<NearLineFigures, 'near' | 'passing' | 'share' | 'priorShare'>): number {
  const counts = { passing, failing: near - passing + 1 };
  const { bayesFactor } = nearLineEvidence(counts, { passing: share, failing: 1 - share });
  return 1 - posterior(priorShare, bayesFactor);
}
