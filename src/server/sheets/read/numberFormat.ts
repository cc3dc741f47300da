/** How a spreadsheet prints a number: enough of the number formats to show a cell as the borrower sees it. */
import type { Decimal } from '#core/money/decimal.ts';

export interface FormatShape {
  readonly percent: boolean;
  /** 1000 for each trailing comma of the format: the sheet shows thousands of what it stores. */
  readonly scale: number;
}

const section = (format: string, index: number): string => format.split(';')[index] ?? '';

/** Text in quotes, brackets and escapes is no part of the pattern. */
const pattern = (part: string): string =>
  part
    .replace(/"[^"]*"/g, '')
    .replace(/\[[^\]]*\]/g, '')
    .replace(/\\./g, '')
    .replace(/[_*]./g, '');

export function formatShape(format: string): FormatShape {
  const first = pattern(section(format, 0));
  const commas = /[0#?](,+)(?![0#?,])/.exec(first)?.[1]?.length ?? 0;
  return { percent: first.includes('%'), scale: 1000 ** commas };
}

/** Prints `amount`, which is already scaled by the format. */
export function printNumber(amount: Decimal, format: string, percent: boolean): string {
  if (percent) return `${amount.times(100).toFixed(decimalsOf(format) ?? 0)} %`;
  if (amount.isZero() && format.split(';').length >= 3) return printZero(section(format, 2), amount, format);
  const decimals = decimalsOf(format) ?? Math.min(amount.decimalPlaces(), 6);
  const grouped = pattern(section(format, 0)).includes(',');
  const digits = amount.abs().toFixed(decimals);
  const printed = grouped ? group(digits) : digits;
  if (!amount.isNegative() || amount.isZero()) return printed;
  return section(format, 1).includes('(') ? `(${printed})` : `-${printed}`;
}

function printZero(part: string, amount: Decimal, format: string): string {
  if (/[0#?]/.test(pattern(part))) return amount.toFixed(decimalsOf(format) ?? 0);
  return part.replace(/"/g, '').replace(/[_*]./g, '').replace(/\\/g, '').trim() || '-';
}

function decimalsOf(format: string): number | null {
  const first = pattern(section(format, 0));
  if (!/[0#?]/.test(first)) return null;
  return /\.([0#?]+)/.exec(first)?.[1]?.length ?? 0;
}

function group(digits: string): string {
  const [whole = '', fraction] = digits.split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  return fraction === undefined ? grouped : `${grouped}.${fraction}`;
}
