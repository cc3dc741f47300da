/** Limits and minima that an agreement computes itself: methods.md A3 and A6. */
import { Decimal } from '../money/decimal.ts';

/**
 * The limit of capital expenditure: the year's own, used first, and a share of what last year left unused.
 *
 * @example capexLimit({ ownYear: decimal(10), unusedLastYear: decimal(4), carriedShare: decimal('0.5') }) // => 12
 */
export const capexLimit = ({
  ownYear,
  unusedLastYear,
  carriedShare,
}: {
  readonly ownYear: Decimal;
  readonly unusedLastYear: Decimal;
  readonly carriedShare: Decimal;
}): Decimal => ownYear.plus(unusedLastYear.times(carriedShare));

/**
 * A minimum that rises with a share of every year's profit and does not fall with losses.
 *
 * @example minimumWithProfits({ base: decimal(40), share: decimal('0.5'), netIncomes: [decimal(6), decimal(-3)] }) // => 43
 */
export const minimumWithProfits = ({
  base,
  share,
  netIncomes,
}: {
  readonly base: Decimal;
  readonly share: Decimal;
  readonly netIncomes: readonly Decimal[];
}): Decimal => base.plus(Decimal.sum(0, ...netIncomes.map((income) => Decimal.max(0, income))).times(share));
