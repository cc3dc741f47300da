/** What must add up, period by period, with the tolerances of methods.md A2. Nothing is plugged. */
import { decimal, ZERO, type Decimal } from '#core/money/decimal.ts';
import { balanceIdentity, cashIdentity, identity } from '#core/statements/identities.ts';
import type { ReadCheck } from '#core/statements/workbookReading.ts';
import { checkedColumns, checkOf, type CheckedTable } from './checkedTables.ts';
import type { EntityColumns } from './entities.ts';
import { sumChecks } from './sumChecks.ts';
import type { Run, SettledColumn } from './statements.ts';
import type { SettledScale } from './units.ts';
import type { Line } from './wordings/lines.ts';

interface Period {
  readonly borrower: string;
  readonly end: string;
  readonly months: number;
  readonly step: Decimal;
  readonly amounts: Map<Line, Decimal>;
}

export function checksOf(tables: readonly CheckedTable[], entities: EntityColumns): ReadCheck[] {
  const periods = periodsOf(tables, entities);
  const checks = [
    ...[...periods.values()].flatMap((period) => balanceChecks(period)),
    ...[...periods.values()].flatMap((period) => cashChecks(period, periods)),
    ...tables.flatMap((checked) => sumChecks(checked, entities)),
    ...quarterChecks(periods),
  ];
  return worstOfEach(checks);
}

/** One line a code and period: the worst, where many borrowers or tables give several. */
function worstOfEach(checks: readonly ReadCheck[]): ReadCheck[] {
  const gravity = ['ties', 'warning', 'does-not-tie'];
  const worst = new Map<string, ReadCheck>();
  for (const check of checks) {
    const key = [check.code, check.periodEnd, check.months, check.code === 'subtotal' ? check.text : ''].join(
      '|',
    );
    const before = worst.get(key);
    if (!before || gravity.indexOf(check.outcome) > gravity.indexOf(before.outcome)) worst.set(key, check);
  }
  return [...worst.values()];
}

/** Figures by period, helper lines included; the first row of a line that is a total, the sum of parts otherwise. */
function periodsOf(tables: readonly CheckedTable[], entities: EntityColumns): Map<string, Period> {
  const periods = new Map<string, Period>();
  for (const { table, scale } of tables) {
    for (const run of table.runs) {
      for (const column of checkedColumns(table, entities)) {
        const months = run.part === 'balance' ? 0 : (column.months ?? 0);
        const isChosen = (entities.columns.get(table) ?? []).length > 0;
        const borrower = entities.borrowerOf(table, column) ?? (isChosen ? '' : column.name);
        const key = [borrower, column.end, months].join('|');
        const step = run.step.times(scale.unit ?? 1);
        const period = periods.get(key) ?? {
          borrower,
          end: column.end,
          months,
          step,
          amounts: new Map<Line, Decimal>(),
        };
        periods.set(key, period);
        addAmounts(period, run, column, scale);
      }
    }
  }
  return periods;
}

/** The wider of two equal-named totals holds the first: the last one counts, as it does for facts. */
function addAmounts(period: Period, run: Run, column: SettledColumn, scale: SettledScale): void {
  run.rows.forEach((read, index) => {
    const amount = run.amounts[index]?.[column.index];
    if (!read.line || !amount || read.ofWhich) return;
    const before = period.amounts.get(read.line);
    const isWider = [...run.signed.sums.sums].some(
      ([total, parts]) => total === index && parts.some((part) => run.rows[part]?.line === read.line),
    );
    if (before && !isWider) return;
    period.amounts.set(read.line, amount.times(run.signed.factorOf(index, read.line)).times(scale.unit ?? 1));
  });
}

function balanceChecks(period: Period): ReadCheck[] {
  const { amounts, step } = period;
  const equity = amounts.get('equity');
  const totalAssets = amounts.get('total_assets');
  const both = amounts.get('total_equity_and_liabilities');
  const liabilities =
    amounts.get('total_liabilities') ??
    sumOf(amounts, 'current_liabilities', 'total_non_current_liabilities');
  if (totalAssets && liabilities && equity) {
    const result = balanceIdentity({
      totalAssets,
      totalLiabilities: liabilities,
      equity,
      roundingUnit: step,
    });
    return [checkOf('balance', 'Total assets against total liabilities and equity', result, period)];
  }
  if (totalAssets && both) {
    const result = identity({
      given: totalAssets,
      parts: [both],
      reference: totalAssets,
      roundingUnit: step,
    });
    return [checkOf('balance', 'Total assets against total equity and liabilities', result, period)];
  }
  return netAssetChecks(period);
}

/** Accounts that end in net assets: assets less creditors on one side, capital and reserves on the other. */
function netAssetChecks({ amounts, step, end, months }: Period): ReadCheck[] {
  const lessCurrent = amounts.get('assets_less_current_liabilities');
  const equity = amounts.get('equity');
  if (!lessCurrent || !equity) return [];
  const later = amounts.get('total_non_current_liabilities') ?? ZERO;
  const result = identity({
    given: equity,
    parts: [lessCurrent, later.neg()],
    reference: lessCurrent,
    roundingUnit: step,
  });
  return [checkOf('balance', 'Net assets against assets less all creditors', result, { end, months })];
}

function sumOf(amounts: ReadonlyMap<Line, Decimal>, ...lines: readonly Line[]): Decimal | null {
  const found = lines.flatMap((line) => amounts.get(line) ?? []);
  return found.length === lines.length
    ? found.reduce((total, amount) => total.plus(amount), decimal(0))
    : null;
}

function cashChecks(period: Period, periods: ReadonlyMap<string, Period>): ReadCheck[] {
  const { amounts, step } = period;
  const [opening, closing] = [amounts.get('opening_cash'), amounts.get('closing_cash')];
  if (!closing) return [];
  const balance = periods.get([period.borrower, period.end, 0].join('|'))?.amounts;
  const totalAssets = balance?.get('total_assets') ?? closing;
  const flows = (['cfo', 'cfi', 'cff', 'fx_on_cash'] as const).flatMap((line) => amounts.get(line) ?? []);
  const change = amounts.get('net_change_in_cash');
  const checks: ReadCheck[] = [];
  if (opening && (flows.length >= 3 || change)) {
    const parts = flows.length >= 3 ? flows : change ? [change] : [];
    const result = cashIdentity({ opening, flows: parts, closing, totalAssets, roundingUnit: step });
    checks.push(checkOf('cash-roll', 'Opening cash and cash flows against closing cash', result, period));
  }
  const onBalance = balance?.get('cash');
  if (onBalance) {
    const restricted = balance?.get('restricted_cash') ?? ZERO;
    const of = (cash: Decimal) =>
      identity({ given: closing, parts: [cash], reference: totalAssets, roundingUnit: step });
    const result = of(onBalance).outcome === 'ties' ? of(onBalance) : of(onBalance.plus(restricted));
    checks.push(checkOf('cash-roll', 'Closing cash against cash in the balance sheet', result, period));
  }
  return checks;
}

/** Quarters against the year to date of the same day. */
function quarterChecks(periods: ReadonlyMap<string, Period>): ReadCheck[] {
  return [...periods.values()].flatMap((period) => {
    if (period.months < 6 || period.months % 3 !== 0 || period.months > 12) return [];
    const revenue = period.amounts.get('revenue');
    const quarters = quarterEnds(period.end, period.months).flatMap(
      (end) => periods.get([period.borrower, end, 3].join('|'))?.amounts.get('revenue') ?? [],
    );
    if (!revenue || quarters.length !== period.months / 3) return [];
    const result = identity({
      given: revenue,
      parts: quarters,
      reference: revenue,
      roundingUnit: period.step,
    });
    return [checkOf('quarters-ytd', 'Revenue of the quarters against the year to date', result, period)];
  });
}

function quarterEnds(end: string, months: number): string[] {
  const [year, month] = end.split('-').map(Number) as [number, number];
  return Array.from({ length: months / 3 }, (_, back) => {
    const day = new Date(Date.UTC(year, month - back * 3, 0));
    return day.toISOString().slice(0, 10);
  });
}
