/** Lengths of periods that the figures prove: by opening cash, by retained earnings, by a shared result. */
import type { PlainDate } from '#core/calendar/plainDate.ts';
import { ZERO, type Decimal } from '#core/money/decimal.ts';
import type { SettledColumn, SettledColumns, StatementTable } from './statements.ts';
import type { Line } from './wordings/lines.ts';

const MONTHS_IN_YEAR = 12;
/** A figure of three digits or fewer can agree by chance. */
const LEAST_PROOF = 1000;

export const proofKey = (table: StatementTable, column: SettledColumn): string =>
  `${table.table.sheet.name}:${table.table.rows[0]?.number}:${column.key}`;

interface Figure {
  readonly table: StatementTable;
  readonly column: SettledColumn;
  readonly amount: Decimal;
}

function figuresOf(settled: SettledColumns, line: Line): Figure[] {
  return [...settled].flatMap(([table, columns]) =>
    table.runs.flatMap((run) =>
      run.rows.flatMap((row, at) => {
        if (row.line !== line) return [];
        return columns.flatMap((column) => {
          const amount = run.amounts[at]?.[column.index];
          return amount && column.scenario === 'actual' ? [{ table, column, amount }] : [];
        });
      }),
    ),
  );
}

/** Months by table and column. A proof that points to two lengths is none. */
export function lengthProofs(settled: SettledColumns): Map<string, number> {
  const found = new Map<string, Set<number>>();
  const add = (figure: Figure, months: number) => {
    const key = proofKey(figure.table, figure.column);
    found.set(key, (found.get(key) ?? new Set()).add(months));
  };
  const spans = (figure: Figure, balances: readonly Figure[]): number[] =>
    balances
      .filter(({ amount, column }) => amount.eq(figure.amount) && column.end < figure.column.end)
      .map(({ column }) => monthsBetween(column.end, figure.column.end))
      .filter((months) => months >= 1 && months <= MONTHS_IN_YEAR);
  const cash = figuresOf(settled, 'cash');
  const opening = figuresOf(settled, 'opening_cash').filter(({ amount }) => amount.abs().gte(LEAST_PROOF));
  for (const figure of opening) for (const months of spans(figure, cash)) add(figure, months);
  for (const figure of figuresOf(settled, 'net_income')) {
    for (const months of retainedMonths(settled, figure)) add(figure, months);
  }
  const proofs = new Map(
    [...found].flatMap(([key, months]) => {
      const [only] = months;
      return months.size === 1 && only !== undefined ? [[key, only] as const] : [];
    }),
  );
  return sharedProofs(settled, proofs);
}

/** The result of the period is what retained earnings grew by, where nothing was paid out. */
function retainedMonths(settled: SettledColumns, result: Figure): number[] {
  if (result.amount.abs().lt(LEAST_PROOF)) return [];
  const retained = figuresOf(settled, 'retained_earnings');
  const closing = retained.find(({ column }) => column.end === result.column.end);
  if (!closing) return [];
  return retained
    .filter(
      ({ column, amount }) =>
        column.end < result.column.end && closing.amount.minus(amount).eq(result.amount),
    )
    .map(({ column }) => monthsBetween(column.end, result.column.end));
}

/** A cash flow column of proven length proves the income column of the same day with the same result. */
function sharedProofs(settled: SettledColumns, proofs: Map<string, number>): Map<string, number> {
  const results = figuresOf(settled, 'net_income');
  for (const start of figuresOf(settled, 'operating_adjustment')) {
    const months = proofs.get(proofKey(start.table, start.column));
    const same = results.find(
      ({ column, amount }) => column.end === start.column.end && amount.eq(start.amount),
    );
    if (months === undefined || !same || start.amount.eq(ZERO)) continue;
    const key = proofKey(same.table, same.column);
    if (!proofs.has(key)) proofs.set(key, months);
  }
  return proofs;
}

const monthsBetween = (from: PlainDate, to: PlainDate): number => {
  const [fromYear, fromMonth] = from.split('-').map(Number) as [number, number];
  const [toYear, toMonth] = to.split('-').map(Number) as [number, number];
  return (toYear - fromYear) * MONTHS_IN_YEAR + toMonth - fromMonth;
};
