import { expect, test } from 'vitest';
import { decimal } from '#core/money/decimal.ts';
import { workOut } from './formulas.ts';

/** Every cell is worth its row; row 9 is not known. */
const byRow = (_sheet: string, row: number) => (row === 9 ? undefined : decimal(row));
const value = (formula: string) => workOut(formula, 'P&L', byRow)?.toFixed();

test.each([
  ['B1+B2-B3', '0'],
  ['=SUM(B1:B4)', '10'],
  ['SUM(B1:B2,B4)*2', '14'],
  ['-($B$5-B2)/3', '-1'],
  ["'Balance sheet'!C4+P1!A1", '5'],
  ['ROUND(B5/3,1)', '1.7'],
])('%s is worked out', (formula, expected) => {
  expect(value(formula)).toBe(expected);
});

test.each([
  'VLOOKUP(A1,B:C,2)',
  'IF(B1=0,1,2)',
  '[1]Sheet1!A1+B2',
  'B1+B9',
  'SUM(B1:B9)',
  'B1/(B2-B2)',
  'B1+',
  'B1 B2',
])('%s is left alone', (formula) => {
  expect(value(formula)).toBeUndefined();
});
