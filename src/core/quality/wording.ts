/** Figures as the explanation lines print them: plain English, whole percents where halves say nothing. */
import { NO_BREAK_SPACE } from '../money/print.ts';

/**
 * 0.064 as '6 %'; `digits` after the point.
 *
 * @example percent(0.064) // => '6\u00a0%'
 */
export const percent = (share: number, digits = 0): string =>
  `${plainNumber(share * 100, digits)}${NO_BREAK_SPACE}%`;

/**
 * 0.19 as '+19 %', -0.04 as '−4 %'.
 *
 * @example signedPercent(-0.04) // => '−4\u00a0%'
 */
export const signedPercent = (share: number, digits = 0): string =>
  `${signedNumber(share * 100, digits)}${NO_BREAK_SPACE}%`;

/**
 * Change of a share in percentage points: 0.022 as '+2.2 points'.
 *
 * @example signedPoints(0.022) // => '+2.2\u00a0points'
 */
export const signedPoints = (share: number): string =>
  `${signedNumber(share * 100, 1)}${NO_BREAK_SPACE}points`;

/**
 * Days without a fraction.
 *
 * @example wholeDays(61.4) // => '61'
 */
export const wholeDays = (days: number): string => plainNumber(days, 0);

/**
 * The verb of a change; none counts as rising.
 *
 * @example rose(-0.1) // => 'fell'
 */
export const rose = (change: number): string => (change >= 0 ? 'rose' : 'fell');

/**
 * Those compared with, as a sector's peers or as the whole book.
 *
 * @example borrowers(14, false) // => '14 peers'
 */
export const borrowers = (count: number, isOfBook: boolean): string =>
  isOfBook ? `${count} borrowers of the whole book` : count === 1 ? '1 peer' : `${count} peers`;

/** With the minus sign that everything else is printed with; nought has no sign. */
function plainNumber(value: number, digits: number): string {
  const text = Math.abs(value).toFixed(digits);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
}

const signedNumber = (value: number, digits: number): string => {
  const text = plainNumber(value, digits);
  return value > 0 && Number(text) !== 0 ? `+${text}` : text;
};
