/** What the score and every published measure make of one simulated book of statements. */
import type { HonestKind } from '#contracts/validation.ts';
import { rankAuc } from '#core/statistics/rankAuc.ts';
import { LAST, type Channel } from './firmPlan.ts';
import { fittedMeasures } from './fittedMeasures.ts';
import { ownMeasures, type Measured } from './ownMeasures.ts';
import { productScores, type ProductScore } from './productScores.ts';
import { statementBook, type Firm } from './statementBook.ts';

/** One firm as it is judged at the last quarter end; more is more suspicious throughout. */
export interface JudgedFirm {
  readonly lifting: { readonly channel: Channel; readonly quartersIn: number } | null;
  readonly kind: HonestKind;
  readonly score: number | null;
  readonly headline: number | null;
  readonly headlineBefore: number | null;
  readonly scoreBefore: number | null;
  readonly blocks: Measured;
  readonly measures: Measured;
}

export interface StatementResult {
  readonly seed: number;
  readonly firms: readonly JudgedFirm[];
}

export function statementResult(seed: number): StatementResult {
  const firms = statementBook(seed);
  const scores = productScores(firms);
  const fitted = fittedMeasures(firms, LAST);
  return {
    seed,
    firms: firms.map((firm, k) => judgedFirm(firm, scores[k]!, fitted[k]!)),
  };
}

function judgedFirm(firm: Firm, product: ProductScore, fitted: Measured): JudgedFirm {
  const { lifting } = firm.plan;
  return {
    lifting: lifting && { channel: lifting.channel, quartersIn: LAST - lifting.from + 1 },
    kind: kindOf(firm, product),
    score: product.latest.score,
    scoreBefore: product.scores.at(-2) ?? null,
    headline: product.headline,
    headlineBefore: product.headlineBefore,
    blocks: Object.fromEntries(product.latest.blocks.map(({ name, risk }) => [name, risk])),
    measures: { ...ownMeasures(firm.quarters, LAST), ...fitted },
  };
}

function kindOf({ plan }: Firm, { peer }: ProductScore): HonestKind {
  if (peer.acquisitionInYear) return 'acquirer';
  if (plan.fastGrowth) return 'fast grower';
  return plan.isSeasonal ? 'seasonal' : 'other';
}

/**
 * Area under the curve of lifting firms against honest ones. A firm for which a figure has no meaning takes the
 * middle of the book, so that leaving firms out is no way to look better.
 */
export function areaOf(
  firms: readonly JudgedFirm[],
  suspicion: (firm: JudgedFirm) => number | null | undefined,
): number {
  const auc = rankAuc(
    filledIn(firms.map(suspicion)),
    firms.map(({ lifting }) => lifting !== null),
  );
  if (!auc.ok) throw new Error('a book needs lifting firms and honest ones');
  return auc.value.estimate;
}

export function filledIn(values: readonly (number | null | undefined)[]): readonly number[] {
  const known = values.filter((value) => typeof value === 'number').sort((a, b) => a - b);
  const middle = known[known.length >> 1] ?? 0;
  return values.map((value) => value ?? middle);
}

export const lowScore = ({ score }: JudgedFirm): number | null => (score === null ? null : -score);
export const lowHeadline = ({ headline }: JudgedFirm): number | null =>
  headline === null ? null : -headline;
