/** How a covenant's figures are printed on the borrower's page. */
import { dayText } from '../../core/calendar/printDay.ts';
import type { CovenantView, TestView } from '../../contracts/borrowers.ts';
import { isMaximum } from '../../core/covenants/covenant.ts';
import { decimal } from '../../core/money/decimal.ts';
import { figureInUnit, levelInUnit } from '../../core/measures/printUnit.ts';
import { formatMoneyInFull } from '../../core/money/print.ts';

type Unit = Pick<CovenantView, 'unit' | 'operator'>;

/** "at most 3.50x", "more than 3.00x", "at least 4.0m"; a day without level says so. */
export function limitText(covenant: Unit, level: string | null): string {
  if (level === null) return 'no level in force';
  const words = { '<=': 'at most', '<': 'less than', '>=': 'at least', '>': 'more than' } as const;
  return `${words[covenant.operator]} ${levelInUnit(covenant.unit, decimal(level))}`;
}

/** The tested figure, with as many digits as show which side of the level it is on. */
export function testedText(covenant: Unit, test: Pick<TestView, 'tested' | 'level'>): string {
  if (test.tested === null) return 'n.m.';
  const beside = test.level === null ? null : decimal(test.level);
  return figureInUnit(covenant.unit, decimal(test.tested), { beside });
}

export const isMaximumTest = (covenant: Pick<CovenantView, 'operator'>): boolean =>
  isMaximum(covenant.operator);

export const amountText = (amount: string): string => formatMoneyInFull(decimal(amount));

/** "12 months to 30 Sep 2026", "at 30 Sep 2026" */
export const periodText = (period: { readonly months: number; readonly periodEnd: string }): string =>
  period.months === 0
    ? `at ${dayText(period.periodEnd)}`
    : `${period.months} months to ${dayText(period.periodEnd)}`;

/** Where the cells behind one amount are shown. */
export const sourceHref = (statementId: number, line: string): string =>
  `/statements/${statementId}/cells/${line}`;
