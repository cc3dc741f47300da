/** Several names for one period are several entities: one is chosen, none is ever added to another. */
import { cellName } from './cells.ts';
import type { Asking } from './asking.ts';
import { plainText } from './plainWords.ts';
import type { SettledColumns, SettledColumn, StatementTable } from './statements.ts';

const NO_ENTITY = /elimin|adjust|konsolidierung|consolidation adj|intercompany|intra.?group|reconcil/;
const BORROWER_HEADING =
  /^(?:borrower|company|client|customer|obligor|debtor|kunde|firma|kreditnehmer|société|emprunteur|empresa|cliente|prestatario)(?: name)?$/i;

export interface EntityColumns {
  /** Of the entity that is meant; none while that is asked. */
  readonly columns: SettledColumns;
  readonly all: SettledColumns;
  /** The borrower that a record of a file of many belongs to, by table and column. */
  readonly borrowerOf: (table: StatementTable, column: SettledColumn) => string | null;
}

export function chooseEntities(
  settled: SettledColumns,
  borrowerName: string | null,
  asking: Asking,
): EntityColumns {
  const borrowers = new Map<StatementTable, ReadonlyMap<string, string>>();
  const rivals = new Map<StatementTable, readonly string[]>();
  for (const [table, columns] of settled) {
    const named = borrowersOfRecords(table, columns);
    if (named) borrowers.set(table, named);
    else {
      const names = rivalNames(columns);
      if (names.length > 0) rivals.set(table, names);
    }
  }
  const borrowerOf = (table: StatementTable, column: SettledColumn) =>
    borrowers.get(table)?.get(column.key) ?? null;
  const answer = entityAnswer(rivals, asking);
  const chosen = new Map(
    [...settled].map(([table, columns]) => {
      if (borrowers.has(table))
        return [table, ofBorrower(columns, table, borrowers, borrowerName, asking)] as const;
      if (!rivals.has(table)) return [table, columns] as const;
      return [
        table,
        columns.filter((column) => answer !== null && plainText(entityOf(column)) === plainText(answer)),
      ] as const;
    }),
  );
  return { columns: chosen, all: settled, borrowerOf };
}

/**
 * Names that stand beside one another for the same period and scenario; a column without a name goes by its heading.
 * Eliminations and adjustments are no choice.
 */
function rivalNames(columns: readonly SettledColumn[]): string[] {
  const names = new Map<string, string>();
  for (const column of columns) {
    const sharing = columns.filter(
      (other) =>
        other.end === column.end && other.months === column.months && other.scenario === column.scenario,
    );
    const distinct = new Set(sharing.map(({ name }) => name));
    if (distinct.size < 2 || sharing.every(({ restated, name }) => restated || name === '')) continue;
    const name = entityOf(column);
    if (!NO_ENTITY.test(column.name)) names.set(plainText(name), name);
  }
  return [...names.values()];
}

/** The name of a column's entity, as the question offers it. */
const entityOf = ({ name, nameText, heading }: SettledColumn): string => (name === '' ? heading : nameText);

/** The only name that is left beside eliminations needs no question. */
function entityAnswer(rivals: ReadonlyMap<StatementTable, readonly string[]>, asking: Asking): string | null {
  const names = [...new Set([...rivals.values()].flat())];
  const [only] = names;
  if (only === undefined || names.length === 1) return only ?? null;
  return askEntity(rivals, names, asking);
}

function askEntity(
  rivals: ReadonlyMap<StatementTable, readonly string[]>,
  names: readonly string[],
  asking: Asking,
): string | null {
  const [table] = rivals.keys();
  const cells =
    table?.table.columns.flatMap(({ headings }) =>
      headings.filter(({ text }) => names.some((name) => name.includes(text))),
    ) ?? [];
  return asking.ask({
    key: 'entity',
    kind: 'entity',
    holdsFor: 'layout',
    text: `Columns on '${table?.table.sheet.name ?? ''}' stand for several entities: ${names.join(', ')}. Which one is the borrower's reporting group? They are never added together.`,
    where: cells.map((cell) => ({ sheet: cell.sheet, cell: cellName(cell) })).slice(0, 12),
    options: names.map((name) => ({ value: name, label: name })),
  });
}

/** In a table of records: the name of the borrower, where a heading says that it is one. */
function borrowersOfRecords(
  table: StatementTable,
  columns: readonly SettledColumn[],
): ReadonlyMap<string, string> | null {
  if (!table.table.transposed) return null;
  const heading = table.table.titles.find(({ text }) => BORROWER_HEADING.test(text.trim()));
  if (!heading) return null;
  const found = columns.flatMap(({ key, index }) => {
    const cell = table.table.columns[index]?.headings.find(({ column }) => column === heading.column);
    return cell ? [[key, cell.text.trim()] as const] : [];
  });
  return new Map(found);
}

function ofBorrower(
  columns: readonly SettledColumn[],
  table: StatementTable,
  borrowers: ReadonlyMap<StatementTable, ReadonlyMap<string, string>>,
  borrowerName: string | null,
  asking: Asking,
): readonly SettledColumn[] {
  if (borrowerName === null) return columns;
  const named = borrowers.get(table) ?? new Map<string, string>();
  const names = [...new Set(named.values())];
  const of = (name: string) =>
    columns.filter(({ key }) => plainText(named.get(key) ?? '') === plainText(name));
  const own = of(borrowerName);
  if (own.length > 0) return own;
  const answer = asking.ask({
    key: 'entity',
    kind: 'entity',
    holdsFor: 'layout',
    text: `The file holds ${names.length} borrowers, and none is called '${borrowerName}'. Which one is meant?`,
    where: [],
    options: names.slice(0, 200).map((name) => ({ value: name, label: name })),
  });
  return answer === null ? [] : of(answer);
}
