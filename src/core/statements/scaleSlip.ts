import { decimal, type Decimal } from '../money/decimal.ts';

/** The scales that a sheet can slip by. */
const SCALES = [10, 100, 1_000, 1_000_000] as const;
const SLIP_WITHIN = decimal('0.1');

export interface ScaleSlip {
  readonly index: number;
  readonly factor: number;
  readonly corrected: Decimal;
}

/**
 * A value that is 10, 100, 1,000 or 1,000,000 times the median of its neighbours, within 10 %: too large by that
 * factor. Null where there is none. Source: methods.md A2.
 *
 * @example scaleSlip([decimal(12500), decimal(12980), decimal(13100000)])?.factor // => 1000
 */
export function scaleSlip(values: readonly Decimal[]): ScaleSlip | null {
  for (const [index, value] of values.entries()) {
    const middle = median(values.filter((_, other) => isNeighbour(index, other)));
    if (middle === null || middle.isZero()) continue;
    const ratio = value.div(middle);
    const factor = SCALES.find((scale) => ratio.div(scale).minus(1).abs().lte(SLIP_WITHIN));
    if (factor) return { index, factor, corrected: value.div(factor) };
  }
  return null;
}

/** The two values before and the two after. */
const isNeighbour = (index: number, other: number): boolean =>
  other !== index && Math.abs(other - index) <= 2;

function median(values: readonly Decimal[]): Decimal | null {
  const sorted = [...values].sort((a, b) => a.comparedTo(b));
  const upper = sorted[Math.floor(sorted.length / 2)];
  const lower = sorted[Math.ceil(sorted.length / 2) - 1];
  return upper && lower ? upper.plus(lower).div(2) : null;
}
