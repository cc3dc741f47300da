/** The same period read twice, from two columns of one table. */
import { cellName } from './cells.ts';
import type { Asking } from './asking.ts';
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
  one.name === other.name &&
  one.currency === other.currency;

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
