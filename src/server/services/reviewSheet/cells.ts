/** Cells of the review sheet, each with the words that are printed for it. */
import type { FigureCell, SheetCell } from '../../../contracts/reviewSheet.ts';
import { NOT_RECORDED } from '../../../contracts/reviewSheet.ts';
import type { MeasureUnit } from '../../../core/measures/measure.ts';
import { figureInUnit, levelInUnit } from '../../../core/measures/printUnit.ts';
import { dayText } from '../../../core/calendar/printDay.ts';
import { decimal, type Decimal, ZERO } from '../../../core/money/decimal.ts';
import {
  formatMoney,
  formatMoneyInFull,
  formatScore,
  formatShare,
  placesThatShowTheSide,
} from '../../../core/money/print.ts';

export const textCell = (text: string): SheetCell => ({ kind: 'text', text });
export const absent = (text: string): SheetCell => ({ kind: 'absent', text });
export const notRecorded: SheetCell = absent(NOT_RECORDED);
export const textOrNotRecorded = (text: string | null): SheetCell =>
  text === null || text === '' ? notRecorded : textCell(text);
export const dayCell = (day: string): SheetCell => ({ kind: 'day', day, text: dayText(day) });

interface Measured {
  readonly unit: MeasureUnit;
  readonly currency: string;
}

/** A tested ratio or amount, with the digits that show the side of its level. */
export const testedCell = (
  { unit, currency }: Measured,
  tested: Decimal,
  level: Decimal | null,
): FigureCell =>
  unit === 'money'
    ? moneyCell(currency, tested, level)
    : figure(unit, tested, placesOf(unit, tested, level), figureInUnit(unit, tested, { beside: level }));

/** Decimals that show the side of the level, of a share those of its per cent. */
const placesOf = (unit: 'times' | 'share', tested: Decimal, level: Decimal | null): number =>
  unit === 'times'
    ? placesThatShowTheSide(tested, level, 2)
    : placesThatShowTheSide(tested.times(100), level && level.times(100), 1);

/** A level in the agreement's words: 'at most 3.50x'. */
export function levelCell({ unit }: Measured, operator: string, level: Decimal): FigureCell {
  const places = { times: Math.max(2, level.dp()), share: Math.max(1, level.dp() - 2), money: level.dp() };
  const cell = figure(unit, level, places[unit], levelInUnit(unit, level));
  return { ...cell, before: operator, text: `${operator} ${cell.text}` };
}

/** An amount in short with its currency on the page; whole in the workbook, whose rows name the currency. */
function moneyCell(currency: string, amount: Decimal, beside: Decimal | null = null): FigureCell {
  const cell = figure(
    'money',
    amount,
    placesThatShowTheSide(amount, beside, 0),
    formatMoney(amount, { beside }),
  );
  return { ...cell, text: `${currency} ${cell.text}` };
}

/** An amount in a column of amounts, whole on the page too. */
export const amountCell = (amount: Decimal): FigureCell =>
  figure('money', amount, amount.dp(), formatMoneyInFull(amount));

/** A share of one, never printed as nought where it is not. */
export const shareCell = (share: Decimal): FigureCell =>
  figure('share', share, placesThatShowTheSide(share.times(100), ZERO, 1), formatShare(share));

export const shareOrAbsent = (share: string | null, words: string): SheetCell =>
  share === null ? absent(words) : shareCell(decimal(share));

export const moneyOrAbsent = (currency: string, amount: string | null, words: string): SheetCell =>
  amount === null ? absent(words) : moneyCell(currency, decimal(amount), ZERO);

/** The score's whole points. A double crosses into text with the digits that give it back. */
export function pointsCell(points: number): FigureCell {
  const value = decimal(points);
  return figure('points', value, 0, formatScore(value));
}

export const countCell = (count: number): FigureCell => figure('count', decimal(count), 0, String(count));

const figure = (unit: FigureCell['unit'], value: Decimal, places: number, text: string): FigureCell => ({
  kind: 'figure',
  unit,
  value: value.toFixed(),
  places,
  before: '',
  text,
});
