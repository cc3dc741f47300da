/** The same line and period read twice: from two columns, or from two tables. */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { cellName } from './cells.ts';
import type { Asking } from './asking.ts';
import type { TableFact } from './facts.ts';
import type { SettledColumns, SettledColumn, StatementTable } from './statements.ts';

/** Of columns for one period and one entity, those that are kept; equal ones once, differing ones asked about. */
export function withoutRepeatedColumns(settled: SettledColumns, asking: Asking): SettledColumns {
  return new Map([...settled].map(([table, columns]) => [table, keptColumns(table, columns, asking)]));
}

/** Of two lengths that are not known yet, only columns headed alike are the same period. */
const samePeriod = (one: SettledColumn, other: SettledColumn): boolean =>
  one.end === other.end &&
  one.months === other.months &&
  (one.months !== null || one.heading === other.heading) &&
  one.scenario === other.scenario &&
  one.name === other.name;

function keptColumns(
  table: StatementTable,
  columns: readonly SettledColumn[],
  asking: Asking,
): SettledColumn[] {
  if (table.table.transposed && new Set(columns.map(({ name }) => name)).size > 1) return [...columns];
  const kept: SettledColumn[] = [];
  for (const column of columns) {
    const at = kept.findIndex((other) => samePeriod(other, column));
    const before = kept[at];
    if (!before || column.scenario !== 'actual') {
      kept.push(column);
      continue;
    }
    if (equalFigures(table, before, column)) {
      asking.note(
        'duplicate-period',
        `Columns '${before.heading}' and '${column.heading}' on '${table.table.sheet.name}' hold the same period with equal figures. It was kept once.`,
        place(table, column),
      );
      continue;
    }
    const newer = before.restated ? before : column;
    const older = newer === before ? column : before;
    const answer = asking.ask({
      key: `restated:${table.table.sheet.name}:${column.end}`,
      kind: 'restated',
      holdsFor: 'file',
      text: `Columns '${older.heading}' (${older.key}) and '${newer.heading}' (${newer.key}) on '${table.table.sheet.name}' hold the same period with different figures. Which version holds?`,
      where: [place(table, older), place(table, newer)],
      options: [
        { value: 'new', label: `The figures of column ${newer.key}` },
        { value: 'old', label: `The figures of column ${older.key}` },
      ],
    });
    kept.splice(at, 1, ...(answer === null ? [] : [answer === 'new' ? newer : older]));
  }
  return kept;
}

const place = (table: StatementTable, column: SettledColumn) => {
  const cell = table.table.columns[column.index]?.headings.at(-1);
  return { sheet: table.table.sheet.name, cell: cell ? cellName(cell) : `${column.key}1` };
};

const equalFigures = (table: StatementTable, one: SettledColumn, other: SettledColumn): boolean =>
  table.runs.every(({ amounts }) =>
    amounts.every((row) => {
      const [first, second] = [row[one.index], row[other.index]];
      return !first || !second || first.eq(second);
    }),
  );

/** Facts of one line and period from several tables: the table that says most of the period is kept. */
export function withoutRepeatedTables(facts: readonly TableFact[], asking: Asking): TableFact[] {
  const groups = new Map<string, TableFact[]>();
  for (const fact of facts) {
    const key = [fact.borrower ?? '', fact.periodEnd, fact.months, fact.code].join('|');
    groups.set(key, [...(groups.get(key) ?? []), fact]);
  }
  const size = new Map<StatementTable, number>();
  for (const { table } of facts) size.set(table, (size.get(table) ?? 0) + 1);
  const rank = (table: StatementTable) => (size.get(table) ?? 0) - (table.table.sheet.hidden ? 1_000_000 : 0);
  return [...groups.values()].flatMap((group) => {
    const tables = [...new Set(group.map(({ table }) => table))].sort(
      (one, other) => rank(other) - rank(one),
    );
    const [first, ...others] = tables;
    if (!first || others.length === 0) return group;
    const of = (table: StatementTable) => group.filter((fact) => fact.table === table);
    const differing = others.filter((table) => !near(total(of(first)), total(of(table)), first));
    if (differing.length === 0) return of(first);
    const chosen = askSheet(first, differing, group[0], asking);
    return chosen === null ? [] : of(tables.find((table) => table.table.sheet.name === chosen) ?? first);
  });
}

const total = (facts: readonly TableFact[]): Decimal =>
  facts.reduce((sum, { amount }) => sum.plus(amount), decimal(0));

/** Equal within rounding to the coarser of two units is not told from equal. */
const near = (one: Decimal, other: Decimal, table: StatementTable): boolean =>
  one
    .minus(other)
    .abs()
    .lte(decimal(table.scale.unit ?? 1).times(2));

function askSheet(
  first: StatementTable,
  differing: readonly StatementTable[],
  fact: TableFact | undefined,
  asking: Asking,
): string | null {
  const names = [...new Set([first, ...differing].map(({ table }) => table.sheet.name))].sort();
  if (names.length < 2) return null;
  return asking.ask({
    key: `which-sheets:${names.join('|')}`.slice(0, 190),
    kind: 'which-sheets',
    holdsFor: 'layout',
    text: `${names.map((name) => `'${name}'`).join(' and ')} give different figures for the same period (first '${fact?.label ?? ''}' to ${fact?.periodEnd ?? ''}). Which sheet counts?`,
    where: fact ? [{ sheet: fact.sheet, cell: fact.cell }] : [],
    options: names.map((name) => ({ value: name, label: name })),
  });
}
