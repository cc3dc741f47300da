/**
 * A trial balance instead of statements: each account goes to a line by its wording or by an answer, amount = debit
 * less credit, turned by the nature of the line. Nothing is taken while an account's line is open.
 */
import { decimal, ZERO, type Decimal } from '#core/money/decimal.ts';
import { lineItem, LINE_ITEMS, type LineItemCode } from '#core/statements/lineItems.ts';
import { identity } from '#core/statements/identities.ts';
import type { Question, ReadCheck, RowPlacement } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import { cellName, type SheetCell } from './cells.ts';
import type { TableFact } from './facts.ts';
import { lineOf, nearLines, PARTS, type Part } from './labels.ts';
import { periodStart } from './periods.ts';
import { COST_LINES, isStandardLine, isSubtotal } from './lineNature.ts';
import { LEAVE_OUT, placementKey, type Run, type SettledColumn, type StatementTable } from './statements.ts';
import type { TableRow } from './tables.ts';
import type { SettledScale } from './units.ts';

export interface TrialBalance {
  readonly facts: readonly TableFact[];
  readonly placements: readonly RowPlacement[];
  readonly checks: readonly ReadCheck[];
}

interface Account {
  readonly row: TableRow;
  readonly cell: SheetCell;
  readonly debit: Decimal;
  readonly credit: Decimal;
}

const TOTAL = /^\s*(?:total|sum(?:me)?|totaux|suma|gesamt)(?![a-z])/i;
const ASSET_LINES: ReadonlySet<LineItemCode> = new Set(
  LINE_ITEMS.slice(
    LINE_ITEMS.findIndex(({ code }) => code === 'cash'),
    LINE_ITEMS.findIndex(({ code }) => code === 'total_assets') + 1,
  ).map(({ code }) => code),
);

export function readTrialBalance(table: StatementTable, scale: SettledScale, asking: Asking): TrialBalance {
  const { accounts, total } = accountsOf(table);
  const places = accounts.map((account) => ({ account, ...placeOf(table, account, asking) }));
  const open = places.flatMap(({ key }) => (key !== null && asking.isOpen(key) ? [key] : []));
  const { end, months } = table.title;
  const facts = places.flatMap(({ account, code }) => {
    if (code === null || isSubtotal(code) || !end || months === null) return [];
    const length = lineItem(code).part === 'balance' ? 0 : months;
    const waits = [...scale.waitsFor.filter((key) => asking.isOpen(key)), ...open];
    return [factOf(table, account, code, { end, months: length }, scale, waits)];
  });
  return {
    facts,
    placements: places.map(({ account, code, reason }) => ({
      sheet: table.table.sheet.name,
      row: account.row.number,
      label: account.row.label,
      code,
      reason,
    })),
    checks: total && end ? [debitsAgainstCredits(accounts, total, end, scale)] : [],
  };
}

function accountsOf({ table, columns }: StatementTable): { accounts: Account[]; total: Account | null } {
  const at = (role: 'debit' | 'credit') => columns.find((column) => column.role === role)?.index ?? -1;
  const [debitAt, creditAt] = [at('debit'), at('credit')];
  const accounts = table.rows.flatMap((row) => {
    const [debit, credit] = [row.cells[debitAt] ?? null, row.cells[creditAt] ?? null];
    const cell = debit?.amount && !debit.amount.isZero() ? debit : (credit ?? debit);
    if (!cell?.amount) return [];
    return [{ row, cell, debit: debit?.amount ?? ZERO, credit: credit?.amount ?? ZERO }];
  });
  const total = accounts.findLast(({ row }) => TOTAL.test(row.label) || row.label === '') ?? null;
  return {
    accounts: accounts.filter((account) => !TOTAL.test(account.row.label) && account.row.label !== ''),
    total,
  };
}

interface Place {
  readonly code: LineItemCode | null;
  readonly reason: string;
  readonly key: string | null;
}

function placeOf(table: StatementTable, { row, cell }: Account, asking: Asking): Place {
  const sheet = table.table.sheet.name;
  const key = placementKey(sheet, row.label);
  const known = PARTS.filter((part) => part !== 'cash-flow').flatMap((part) => {
    const line = lineOf(row.label, part, null);
    return isStandardLine(line) ? [line] : [];
  });
  const answer = asking.answerTo(key);
  const [only] = known;
  if (answer === null && known.length === 1 && only)
    return { code: only, reason: 'known wording', key: null };
  const given = asking.ask({
    key,
    kind: 'placement',
    holdsFor: 'layout',
    text: `Account '${row.label}' on '${sheet}': which line does it belong to?`,
    where: [{ sheet, cell: cellName(cell) }],
    options: optionsFor(row.label),
    accepts: (value) => value === LEAVE_OUT || LINE_ITEMS.some(({ code }) => code === value),
  });
  if (given === null) return { code: null, reason: 'unknown wording', key };
  return {
    code: isStandardLine(given as LineItemCode) ? (given as LineItemCode) : null,
    reason: 'as answered',
    key,
  };
}

function optionsFor(label: string): Question['options'] {
  const parts: readonly Part[] = ['income', 'balance'];
  const near = parts.flatMap((part) => nearLines(label, part, null));
  const likely = near
    .sort((one, other) => other.likeness - one.likeness)
    .flatMap(({ line }) => (isStandardLine(line) ? [line] : []));
  const all = LINE_ITEMS.filter((item) => item.part === 'income' || item.part === 'balance').map(
    ({ code }) => code,
  );
  const codes = [...new Set<LineItemCode>([...likely.slice(0, 5), ...all])].filter(
    (code) => !isSubtotal(code) || code === 'equity',
  );
  return [
    ...codes.map((code) => ({ value: code, label: lineItem(code).label })),
    { value: LEAVE_OUT, label: 'No line: leave it out' },
  ];
}

/** Assets and costs stand in debit, everything else in credit. */
function factOf(
  table: StatementTable,
  { row, cell, debit, credit }: Account,
  code: LineItemCode,
  period: { readonly end: SettledColumn['end']; readonly months: number },
  scale: SettledScale,
  waitsFor: readonly string[],
): TableFact {
  const inDebit = ASSET_LINES.has(code) || COST_LINES.has(code);
  const amount = (inDebit ? debit.minus(credit) : credit.minus(debit)).times(scale.unit ?? 1);
  const words = table.columns.find(({ role }) => role === 'debit') ?? table.columns[0];
  if (!words) throw new Error('a trial balance has columns');
  return {
    code,
    periodEnd: period.end,
    months: period.months,
    periodStart: periodStart(period.end, period.months),
    amount: amount.isZero() ? '0' : amount.toFixed(),
    sheet: cell.sheet,
    cell: cellName(cell),
    rawText: cell.text,
    label: row.label,
    fromFormula: cell.fromFormula,
    waitsFor,
    borrower: null,
    table,
    column: { ...words, ...period, needs: null },
    run: emptyRun(lineItem(code).part === 'balance' ? 'balance' : 'income'),
    rowIndex: 0,
  };
}

const emptyRun = (part: Part): Run => ({
  part,
  rows: [],
  amounts: [],
  step: decimal('0.01'),
  signed: {
    sums: { signs: new Map(), sums: new Map(), untied: new Map(), contradicted: new Set() },
    factorOf: () => 1,
    unsettled: new Set(),
    losses: new Set(),
    costsNegative: false,
    liabilitiesNegative: false,
  },
});

function debitsAgainstCredits(
  accounts: readonly Account[],
  total: Account,
  end: string,
  scale: SettledScale,
): ReadCheck {
  const sum = (of: (account: Account) => Decimal) =>
    accounts.reduce((all, account) => all.plus(of(account)), decimal(0));
  const [debits, credits] = [sum(({ debit }) => debit), sum(({ credit }) => credit)];
  const result = identity({
    given: debits,
    parts: [credits],
    reference: total.debit,
    roundingUnit: decimal('0.01'),
  });
  return {
    code: 'debits-credits',
    text: 'Total debits against total credits',
    outcome: result.outcome,
    difference: result.difference.times(scale.unit ?? 1).toFixed(),
    tolerance: result.tolerance.times(scale.unit ?? 1).toFixed(),
    periodEnd: end,
    months: 0,
  };
}
