import { expect, test } from 'vitest';
import { isLineItemCode } from '#core/statements/lineItems.ts';
import { lineOf } from '../labels.ts';
import { plainLabel } from '../plainWords.ts';
import { BALANCE_WORDINGS } from './balance.ts';
import { CASH_FLOW_WORDINGS } from './cashFlow.ts';
import { INCOME_WORDINGS } from './income.ts';
import { HELPER_LINES, type Wordings } from './lines.ts';

const PARTS = [INCOME_WORDINGS, BALANCE_WORDINGS, CASH_FLOW_WORDINGS];
const entries = (wordings: Wordings) =>
  Object.entries(wordings).flatMap(([line, texts]) =>
    texts.split('|').map((text) => [plainLabel(text), line] as const),
  );

test.each(PARTS)('in the $part wordings no text means two lines', ({ anywhere, within }) => {
  for (const wordings of [anywhere, ...Object.values(within)]) {
    const lines = new Map<string, string>();
    const twice = entries(wordings).filter(([text, line]) => {
      const before = lines.get(text);
      lines.set(text, line);
      return before !== undefined && before !== line;
    });
    expect(twice).toEqual([]);
  }
});

test.each(PARTS)(
  'in the $part wordings every line is a standard or a helper line, and no text is empty',
  ({ anywhere, within }) => {
    for (const [text, line] of [anywhere, ...Object.values(within)].flatMap(entries)) {
      expect(isLineItemCode(line) || HELPER_LINES.some((helper) => helper === line), line).toBe(true);
      expect(text, line).not.toBe('');
    }
  },
);

test.each([
  ['1. Umsatzerlöse', 'income', null, 'revenue'],
  ['UMSATZERLOESE', 'income', null, 'revenue'],
  ["Chiffre d'affaires", 'income', null, 'revenue'],
  ['II. Forderungen aus Lieferungen und Leistungen', 'balance', null, 'receivables'],
  ['Summe Fremdkapital (B + C)', 'balance', null, 'total_liabilities'],
  ['Borrowings', 'balance', 'current-liabilities', 'short_term_debt'],
  ['Borrowings', 'balance', 'non-current-liabilities', 'senior_debt'],
  ['Other', 'balance', 'current-assets', 'other_current_assets'],
  ['Interest paid', 'income', null, 'interest_expense'],
  ['Interest paid', 'cash-flow', null, 'interest_paid'],
  ['Amortización', 'income', null, 'depreciation_and_amortisation'],
  ['Amortización de préstamos', 'cash-flow', null, 'debt_repaid'],
  ['Rückstellungen', 'balance', null, 'accrued_liabilities'],
  ['Reserves', 'balance', null, 'retained_earnings'],
  ['4000 Sales', 'income', null, 'revenue'],
  ['Factoring fees', 'income', null, null],
] as const)("'%s' in %s %s is %s", (label, part, section, line) => {
  expect(lineOf(label, part, section)).toBe(line);
});
