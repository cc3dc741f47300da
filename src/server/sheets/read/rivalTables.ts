/**
 * The same line and period in several tables. Equal figures are taken once. Where two tables differ in as much as they
 * agree, nothing of either is taken before one is chosen: they may be two companies, or two versions of one.
 */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import type { Asking } from './asking.ts';
import { cellName, type SheetCell } from './cells.ts';
import type { TableFact } from './facts.ts';
import { readHeadingText, saysPeriod } from './headingText.ts';
import { partOfTitle } from './labels.ts';
import type { StatementTable } from './statements.ts';

type Groups = ReadonlyMap<string, readonly TableFact[]>;

export function withoutRivalTables(facts: readonly TableFact[], asking: Asking): TableFact[] {
  const names = tableNames(facts);
  const groups = groupsOf(facts);
  const rivals = rivalsOf(groups);
  const left = new Set<TableFact>();
  for (const cluster of clustersOf(rivals)) {
    const chosen = askWhich(cluster, names, facts, asking);
    for (const fact of facts) if (cluster.has(fact.table) && !chosen.has(fact.table)) left.add(fact);
  }
  const open = facts.filter((fact) => !left.has(fact));
  return [...groupsOf(open).values()].flatMap((group) => onceEach(group, names, asking));
}

function groupsOf(facts: readonly TableFact[]): Groups {
  const groups = new Map<string, TableFact[]>();
  for (const fact of facts) {
    const key = [fact.borrower ?? '', fact.periodEnd, fact.months, fact.code].join('|');
    groups.set(key, [...(groups.get(key) ?? []), fact]);
  }
  return groups;
}

interface Comparison {
  agree: number;
  differ: number;
}

/** Pairs of tables that differ in at least as many figures as they agree in. */
function rivalsOf(groups: Groups): (readonly [StatementTable, StatementTable])[] {
  const compared = new Map<StatementTable, Map<StatementTable, Comparison>>();
  for (const group of groups.values()) {
    const tables = [...new Set(group.map(({ table }) => table))];
    tables.forEach((one, at) => {
      for (const other of tables.slice(at + 1)) {
        const row = compared.get(one) ?? new Map<StatementTable, Comparison>();
        compared.set(one, row);
        const pair = row.get(other) ?? { agree: 0, differ: 0 };
        row.set(other, pair);
        if (near(of(group, one), of(group, other))) pair.agree += 1;
        else pair.differ += 1;
      }
    });
  }
  return [...compared].flatMap(([one, row]) =>
    [...row].flatMap(([other, { agree, differ }]) =>
      differ > 0 && differ >= agree ? [[one, other] as const] : [],
    ),
  );
}

function clustersOf(pairs: readonly (readonly [StatementTable, StatementTable])[]): Set<StatementTable>[] {
  let clusters: Set<StatementTable>[] = [];
  for (const pair of pairs) {
    const touching = clusters.filter((cluster) => pair.some((table) => cluster.has(table)));
    const joined = new Set([...pair, ...touching.flatMap((cluster) => [...cluster])]);
    clusters = [...clusters.filter((cluster) => !touching.includes(cluster)), joined];
  }
  return clusters;
}

/** The tables that count: none while that is open. By sheet where the sheets differ, else by the name above each. */
function askWhich(
  cluster: ReadonlySet<StatementTable>,
  names: ReadonlyMap<StatementTable, string>,
  facts: readonly TableFact[],
  asking: Asking,
): ReadonlySet<StatementTable> {
  const tables = [...cluster];
  const sheets = new Set(tables.map(sheetOf));
  const first = facts.find(({ table }) => cluster.has(table));
  if (sheets.size > 1) {
    const chosen = askSheet([...sheets], first, asking);
    const own = tables.filter((table) => sheetOf(table) === chosen);
    return new Set(own).size > 1 ? chosenOfSheet(own, names, facts, asking) : new Set(own);
  }
  return chosenOfSheet(tables, names, facts, asking);
}

function chosenOfSheet(
  tables: readonly StatementTable[],
  names: ReadonlyMap<StatementTable, string>,
  facts: readonly TableFact[],
  asking: Asking,
): ReadonlySet<StatementTable> {
  const nameOf = (table: StatementTable): string => {
    const name = names.get(table) ?? '';
    const isShared = tables.some((other) => other !== table && names.get(other) === name);
    return isShared ? `${name}, ${tableFrom(table)}` : name;
  };
  const options = tables.map(nameOf);
  const where = tables.flatMap((table) => facts.find((fact) => fact.table === table) ?? []);
  const answer = asking.ask({
    key: 'entity',
    kind: 'entity',
    holdsFor: 'layout',
    text: `'${sheetOf(tables[0] as StatementTable)}' holds several tables with different figures for the same period: ${options.join(', ')}. Which one is the borrower's reporting group? They are never added together.`,
    where: where.map(({ sheet, cell }) => ({ sheet, cell })),
    options: options.map((name) => ({ value: name, label: name })),
  });
  return new Set(tables.filter((table) => nameOf(table) === answer));
}

const sheetOf = ({ table }: StatementTable): string => table.sheet.name;

/** Equal figures once, from the table that says most; single differing ones only by choice of the sheet. */
function onceEach(
  group: readonly TableFact[],
  names: ReadonlyMap<StatementTable, string>,
  asking: Asking,
): readonly TableFact[] {
  const tables = [...new Set(group.map(({ table }) => table))];
  const size = (table: StatementTable) =>
    table.runs.reduce((count, { rows }) => count + rows.filter(({ line }) => line !== null).length, 0) -
    (table.table.sheet.hidden ? 1_000_000 : 0);
  const [first, ...others] = tables.sort((one, other) => size(other) - size(one));
  if (!first || others.length === 0) return group;
  const differing = others.filter((table) => !near(of(group, first), of(group, table)));
  if (differing.length === 0) return of(group, first);
  const sheets = new Set([first, ...differing].map(sheetOf));
  if (sheets.size > 1) {
    const chosen = askSheet([...sheets], group[0], asking);
    const [own] = tables.filter((table) => sheetOf(table) === chosen);
    return own ? of(group, own) : [];
  }
  const chosen = chosenOfSheet([first, ...differing], names, group, asking);
  return group.filter(({ table }) => chosen.has(table));
}

const of = (group: readonly TableFact[], table: StatementTable): TableFact[] =>
  group.filter((fact) => fact.table === table);

const total = (facts: readonly TableFact[]): Decimal =>
  facts.reduce((sum, { amount }) => sum.plus(amount), decimal(0));

/** Equal within rounding to the coarser of the two. */
function near(one: readonly TableFact[], other: readonly TableFact[]): boolean {
  const steps = [...one, ...other].map(({ run, table }) => run.step.times(table.scale.unit ?? 1));
  const coarsest = steps.reduce((most, step) => (step.gt(most) ? step : most), decimal(0));
  return total(one).minus(total(other)).abs().lte(coarsest.times(2));
}

function askSheet(names: readonly string[], fact: TableFact | undefined, asking: Asking): string | null {
  const sorted = [...names].sort();
  return asking.ask({
    key: `which-sheets:${sorted.join('|')}`.slice(0, 190),
    kind: 'which-sheets',
    holdsFor: 'layout',
    text: `${sorted.map((name) => `'${name}'`).join(' and ')} give different figures for the same period (first '${fact?.label ?? ''}' to ${fact?.periodEnd ?? ''}). Which sheet counts?`,
    where: fact ? [{ sheet: fact.sheet, cell: fact.cell }] : [],
    options: sorted.map((name) => ({ value: name, label: name })),
  });
}

/** The name that stands above each table, or above an earlier one of its sheet; its rows where there is none. */
function tableNames(facts: readonly TableFact[]): Map<StatementTable, string> {
  const tables = [...new Set(facts.map(({ table }) => table))];
  const firstRow = ({ table }: StatementTable) => table.rows[0]?.number ?? 0;
  const found = new Map<StatementTable, string>();
  const own = new Map(
    tables.map((table) => [table, table.table.titles.findLast(isName)?.text.trim() ?? null]),
  );
  for (const table of tables) {
    const above = tables
      .filter((other) => sheetOf(other) === sheetOf(table) && firstRow(other) <= firstRow(table))
      .sort((one, other) => firstRow(other) - firstRow(one));
    const named = above.map((other) => own.get(other) ?? null).find((name) => name !== null);
    found.set(table, named ?? tableFrom(table));
  }
  return found;
}

const tableFrom = ({ table }: StatementTable): string => {
  const cell = table.rows.flatMap(({ cells }) => cells).find((candidate) => candidate !== null);
  return `the table from ${cell ? cellName(cell) : 'the top'}`;
};

function isName(cell: SheetCell): boolean {
  const heading = readHeadingText(cell.text);
  return (
    heading.rest !== '' &&
    !saysPeriod(heading) &&
    heading.scale.unit === null &&
    heading.scale.currency === null &&
    partOfTitle(cell.text) === null
  );
}
