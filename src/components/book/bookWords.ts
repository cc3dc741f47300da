/** How the page of the book prints its figures. */
import { FEWER_THAN_SHOWN } from '../../contracts/book.ts';
import { FEWEST_BORROWERS, type TooFewBorrowers } from '../../core/patterns/bookParts.ts';
import type { TooFewNearLimit } from '../../core/patterns/nearLimit.ts';
import { formatProbability } from '../../core/patterns/patternWording.ts';
import type { SidesOfLimit } from '../../core/patterns/sidesOfLimit.ts';
import type { DensityBreakError } from '../../core/statistics/densityBreak.ts';
import type { StatisticsError } from '../../core/statistics/statisticsError.ts';

const MINUS = '\u2212';
const NARROW = '\u00a0';

/** 16,018 */
export const countText = (count: number): string => count.toLocaleString('en-GB');

/** Figures over fewer than five would speak of one borrower. */
export const crossDeskCount = (count: number): string =>
  count < FEWEST_BORROWERS ? FEWER_THAN_SHOWN : countText(count);

export const signed = (value: number, places = 2): string =>
  `${value < 0 ? MINUS : ''}${Math.abs(value).toFixed(places)}`;

/** A standardized difference; three empty intervals have none. */
export const zText = (z: number | null, places = 2): string => (z === null ? 'undefined' : signed(z, places));

export const pText = (p: number | null): string => (p === null ? 'undefined' : `p ${formatProbability(p)}`);

/** 0.02 is "2 %". */
export const shareText = (share: number, places = 0): string => `${signed(share * 100, places)}${NARROW}%`;

/** "1.9, p 0.030" of the interval on the passing side. */
export const rightText = ({ right, pRight }: SidesOfLimit): string =>
  `${zText(right.zMultinomial)}, ${pText(pRight)}`;

/** Why there is no estimate. */
export function errorText(error: StatisticsError | DensityBreakError): string {
  switch (error.kind) {
    case 'too-few-points':
      return `not done: ${error.given} points, ${error.needed} are needed`;
    case 'no-spread':
      return 'not done: all values are equal';
    case 'cut-off outside the values':
      return 'not done: every test ends on one side of the limit';
    case 'no density at the cut-off':
      return 'not done: no density is left at the limit';
    default:
      return 'not done';
  }
}

/** Why a part of the book is not shown: what, why, what to do. */
export function refusalText(error: TooFewNearLimit | TooFewBorrowers): string {
  return error.kind === 'too few borrowers'
    ? `Refused: ${FEWER_THAN_SHOWN} borrowers. Figures of so few would speak of one of them.`
    : `Refused: ${crossDeskCount(error.given)} tests within 10${NARROW}% of the limit, ${error.needed} are needed. Fewer show nothing either way.`;
}

/** In a row of a table. */
export const shortRefusal = (error: TooFewNearLimit): string =>
  `${crossDeskCount(error.given)} tests near the limit, ${error.needed} needed`;
