/**
 * What must add up in a set of accounts. A difference within rounding ties; up to 0.5 % of the reference it is a
 * warning; above, the figures do not tie: they are taken, marked, and left out of score and peer groups.
 * Source: methods.md A2.
 */
import { Decimal } from '../money/decimal.ts';
import type { Tie } from './statement.ts';
import { roundingTolerance, tieOf } from './tolerance.ts';

export interface IdentityResult {
  /** What the parts add up to. */
  readonly expected: Decimal;
  readonly difference: Decimal;
  readonly tolerance: Decimal;
  /** The difference as a share of the reference; null where that is nought. */
  readonly share: Decimal | null;
  readonly outcome: Exclude<Tie, 'not-checked'>;
}

/**
 * One figure against what its parts add up to: difference = given - expected.
 *
 * `reference` is total assets for balances and cash, revenue for income; `roundingUnit` the unit that each of the
 * `figures` was rounded to, nought where the figures are exact.
 *
 * @example identity({ given: decimal(31), parts: [decimal(80), decimal(-48)], reference: decimal(80), roundingUnit: ZERO }).outcome // => 'does-not-tie'
 */
export function identity({
  given,
  parts,
  reference,
  roundingUnit,
}: {
  readonly given: Decimal;
  readonly parts: readonly Decimal[];
  readonly reference: Decimal;
  readonly roundingUnit: Decimal;
}): IdentityResult {
  const expected = Decimal.sum(0, ...parts);
  const difference = given.minus(expected);
  const tolerance = roundingTolerance({ roundingUnit, figures: parts.length + 1, reference });
  return {
    expected,
    difference,
    tolerance,
    share: reference.isZero() ? null : difference.div(reference.abs()),
    outcome: tieOf(difference, tolerance, reference),
  };
}

/**
 * Total assets = total liabilities + equity.
 *
 * @example balanceIdentity({ totalAssets: decimal(96), totalLiabilities: decimal(58), equity: decimal(38), roundingUnit: ZERO }).outcome // => 'ties'
 */
export const balanceIdentity = ({
  totalAssets,
  totalLiabilities,
  equity,
  roundingUnit,
}: {
  readonly totalAssets: Decimal;
  readonly totalLiabilities: Decimal;
  readonly equity: Decimal;
  readonly roundingUnit: Decimal;
}): IdentityResult =>
  identity({ given: totalAssets, parts: [totalLiabilities, equity], reference: totalAssets, roundingUnit });

/**
 * Opening cash + operating + investing + financing cash flow + currency effect = closing cash, flows signed.
 *
 * @example cashIdentity({ opening: decimal(8), flows: [decimal('1.7'), decimal('-9.5'), decimal('6.8')], closing: decimal(7), totalAssets: decimal(110), roundingUnit: ZERO }).outcome // => 'ties'
 */
export function cashIdentity({
  opening,
  flows,
  closing,
  totalAssets,
  roundingUnit,
}: {
  readonly opening: Decimal;
  readonly flows: readonly Decimal[];
  readonly closing: Decimal;
  readonly totalAssets: Decimal;
  readonly roundingUnit: Decimal;
}): IdentityResult {
  const result = identity({
    given: closing,
    parts: [opening, ...flows],
    reference: totalAssets,
    roundingUnit,
  });
  return {
    ...result,
    difference: result.difference.negated(),
    share: result.share && result.share.negated(),
  };
}

/**
 * Opening retained earnings + net income - dividends + named entries = closing.
 *
 * An unexplained entry is a signal of quality, not a matter of rounding: beyond the tolerance it is a warning,
 * however large.
 *
 * @example retainedEarningsIdentity({ opening: decimal(20), netIncome: decimal(5), dividends: decimal(1), namedEntries: ZERO, closing: decimal(20), totalAssets: decimal(110), roundingUnit: ZERO }).outcome // => 'warning'
 */
export function retainedEarningsIdentity({
  opening,
  netIncome,
  dividends,
  namedEntries,
  closing,
  totalAssets,
  roundingUnit,
}: {
  readonly opening: Decimal;
  readonly netIncome: Decimal;
  /** Positive where paid. */
  readonly dividends: Decimal;
  readonly namedEntries: Decimal;
  readonly closing: Decimal;
  readonly totalAssets: Decimal;
  readonly roundingUnit: Decimal;
}): IdentityResult & { readonly shareOfNetIncome: Decimal | null } {
  const result = identity({
    given: closing,
    parts: [opening, netIncome, dividends.negated(), namedEntries],
    reference: totalAssets,
    roundingUnit,
  });
  return {
    ...result,
    outcome: result.outcome === 'ties' ? 'ties' : 'warning',
    shareOfNetIncome: netIncome.isZero() ? null : result.difference.abs().div(netIncome.abs()),
  };
}
