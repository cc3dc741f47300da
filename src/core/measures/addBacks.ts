/** Add-backs as the agreement allows them: some without limit, the others up to a share of EBITDA. */
import { reportingMonthEnd } from '../calendar/fiscalYear.ts';
import { monthCount, type PlainDate } from '../calendar/plainDate.ts';
import { Decimal, ZERO } from '../money/decimal.ts';
import type { AddBack } from './definition.ts';

export interface AddBackTerms {
  /** Share of EBITDA; null is no cap. */
  readonly cap: Decimal | null;
  readonly basis: 'before' | 'after';
}

export interface AllowedAddBacks {
  /** The most that the capped add-backs may come to; null without a cap. */
  readonly limit: Decimal | null;
  /** What is taken of the capped add-backs. */
  readonly allowed: Decimal;
  readonly disallowed: Decimal;
  readonly adjusted: Decimal;
}

/**
 * Adjusted EBITDA = EBITDA + uncapped add-backs + the smaller of the capped ones and their limit.
 *
 * With B = EBITDA + uncapped and cap c, the limit is c x B before the add-backs and c / (1 - c) x B after them;
 * nought where B is not positive. Same currency unit throughout. Source: methods.md A3.
 *
 * @example allowAddBacks({ ebitda: decimal(10), uncapped: ZERO, capped: decimal(4), terms: { cap: decimal('0.25'), basis: 'before' } }).adjusted // => 12.5
 */
export function allowAddBacks({
  ebitda,
  uncapped,
  capped,
  terms,
}: {
  readonly ebitda: Decimal;
  readonly uncapped: Decimal;
  readonly capped: Decimal;
  readonly terms: AddBackTerms;
}): AllowedAddBacks {
  const limit = addBackLimit(ebitda.plus(uncapped), terms);
  const allowed = limit === null ? capped : Decimal.min(capped, limit);
  return {
    limit,
    allowed,
    disallowed: capped.minus(allowed),
    adjusted: ebitda.plus(uncapped).plus(allowed),
  };
}

function addBackLimit(base: Decimal, { cap, basis }: AddBackTerms): Decimal | null {
  if (cap === null || (basis === 'after' && cap.gte(1))) return null;
  if (base.lte(0)) return ZERO;
  const share = base.times(cap);
  // Divided last: a third that was rounded first would put 4 of 12 a trace below its limit.
  return basis === 'before' ? share : share.div(cap.negated().plus(1));
}

/**
 * The add-backs whose whole period lies within the months up to a day. One that reaches further back is left out:
 * no rule says which part of it would count.
 *
 * @example addBacksWithin(12, [buildAddBack('2025-09-30', 2)], '2026-09-30') // => []
 */
export function addBacksWithin(
  lengthInMonths: number,
  addBacks: readonly AddBack[],
  date: PlainDate,
): readonly AddBack[] {
  const closing = monthCount(reportingMonthEnd(date));
  return addBacks.filter(({ periodEnd, months }) => {
    const end = monthCount(reportingMonthEnd(periodEnd));
    return end <= closing && end - months >= closing - lengthInMonths;
  });
}

/**
 * EBITDA with a full year of what was bought: LTM EBITDA + the target's own twelve months before the acquisition.
 * Source: methods.md A3.
 *
 * @example proFormaEbitda(decimal(12), decimal(3)) // => 15
 */
export const proFormaEbitda = (ebitda: Decimal, targetBeforeAcquisition: Decimal): Decimal =>
  ebitda.plus(targetBeforeAcquisition);
