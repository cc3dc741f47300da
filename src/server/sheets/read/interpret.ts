/** THE WALK: grids → tables → periods → units → entities → placed rows → facts → checks → reading. */
import type {
  Reading,
  ReadingContext,
  ReadNote,
  ReadRefusal,
  RowPlacement,
} from '#core/statements/workbookReading.ts';
import { Asking } from './asking.ts';
import { cellName, type SheetGrid, type WorkbookGrid } from './cells.ts';
import { isCertificate, readCertificate } from './certificate.ts';
import { checksOf } from './checks.ts';
import { chooseEntities } from './entities.ts';
import { factsOfRun, type TableFact } from './facts.ts';
import { withoutJumps } from './jumps.ts';
import { layoutKeyOf } from './layoutKey.ts';
import { settleColumns } from './lengths.ts';
import { refuseForGaps } from './needed.ts';
import { noteContents } from './remarks.ts';
import { holdsPersonalData } from './personalSheets.ts';
import { placeRows, type PlacedRow } from './placing.ts';
import { askUnbalanced, readingOf, refusedReading } from './readings.ts';
import { refusal } from './refusals.ts';
import { withoutRepeatedColumns } from './repeats.ts';
import { withoutRivalTables } from './rivalTables.ts';
import { withoutSetAside } from './setAside.ts';
import { readTrialBalance } from './trialBalance.ts';
import { isStandardLine } from './lineNature.ts';
import { type SettledColumns, statementTables, type Run, type StatementTable } from './statements.ts';
import { isAmount } from './segments.ts';

import { settleScales, type SettledScale } from './units.ts';
import { periodEvidence } from './yearEnd.ts';

export function interpret(grid: WorkbookGrid, notes: readonly ReadNote[], context: ReadingContext): Reading {
  const asking = new Asking(context.answers);
  for (const { code, text, where } of notes) asking.note(code, text, where);
  const sheets = grid.sheets.filter((sheet) => !isPersonal(sheet, asking));
  const open: WorkbookGrid = { kind: grid.kind, sheets };
  const found = sheets.flatMap((sheet) => statementTables(sheet, asking));
  const certificates = found.filter(isCertificate);
  const tables = withStatements(found.filter((table) => !certificates.includes(table)));
  const empty = refuseWithoutAmounts(sheets, [...tables, ...certificates]);
  if (empty) return refusedReading(empty, open, tables, asking);

  const evidence = periodEvidence(open, [...tables, ...certificates], context.fiscalYearEndMonth, asking);
  const settled = withoutRepeatedColumns(settleColumns(tables, evidence, asking), asking);
  const gaps = refuseForGaps(open, settled, asking);
  if (gaps) return refusedReading(gaps, open, tables, asking);

  const scales = settleScales(open, [...tables, ...certificates], context, asking);
  const entities = chooseEntities(settled, context.borrowerName ?? null, asking);
  const placed = placeTables(tables, entities.columns, asking);
  const placedFacts = placed.flatMap(({ table, run, rows }) =>
    factsOfRun(table, run, rows, scaleOf(scales, table), entities, asking),
  );
  const ledgers = tables
    .filter(({ isTrialBalance }) => isTrialBalance)
    .map((table) => readTrialBalance(table, scaleOf(scales, table), asking));
  const all = [...placedFacts, ...ledgers.flatMap((ledger) => ledger.facts)];
  const single = withoutSetAside(withoutRivalTables(withoutDoubledDepreciation(all), asking), asking);
  const certified = certificates.map((table) =>
    readCertificate(table, scaleOf(scales, table), evidence, single, asking),
  );
  const checks = [
    ...certified.flatMap((certificate) => certificate.checks),
    ...checksOf(
      tables.map((table) => ({ table, scale: scaleOf(scales, table) })),
      entities,
    ),
    ...ledgers.flatMap((ledger) => ledger.checks),
  ];
  const facts = askUnbalanced(withoutJumps(single, context, asking), checks, asking);
  if (
    facts.length === 0 &&
    certificates.length === 0 &&
    asking.questions.every(({ answer }) => answer !== null)
  ) {
    const nothing = refusal(
      'no-amounts',
      null,
      'no income statement, balance sheet or cash flow statement was recognised in the file',
    );
    return refusedReading(nothing, open, tables, asking);
  }
  noteContents(sheets, tables, facts, asking);
  return readingOf({
    grid: open,
    tables,
    settled,
    facts,
    addBacks: certified.flatMap((certificate) => certificate.addBacks),
    checks,
    asking,
    scales,
    placements: [
      ...placed.flatMap(({ table, rows }) => placementsOf(table, rows)),
      ...ledgers.flatMap((ledger) => ledger.placements),
    ],
    layoutKey: layoutKeyOf([...tables, ...certificates]),
  });
}

/** Tables of other things (staff, ratios, cover) are asked about nothing. */
function withStatements(tables: readonly StatementTable[]): StatementTable[] {
  const lines = ({ runs }: StatementTable) =>
    runs.reduce((count, { rows }) => count + rows.filter(({ line }) => isStandardLine(line)).length, 0);
  const most = Math.max(0, ...tables.map(lines));
  return tables.filter((table) => table.isTrialBalance || lines(table) >= Math.min(2, Math.max(1, most)));
}

const scaleOf = (scales: ReadonlyMap<StatementTable, SettledScale>, table: StatementTable): SettledScale =>
  scales.get(table) ?? { unit: null, currency: null, waitsFor: [], leftOut: false };

function isPersonal(sheet: SheetGrid, asking: Asking): boolean {
  if (!holdsPersonalData(sheet)) return false;
  const where = { sheet: sheet.name, cell: 'A1' };
  asking.note(
    'personal-data-not-read',
    `Sheet '${sheet.name}' seems to hold personal data. It was not imported.`,
    where,
  );
  return true;
}

/** Zero totals of empty cells are no figures; a picture of figures is none either. */
function refuseWithoutAmounts(
  sheets: readonly SheetGrid[],
  tables: readonly StatementTable[],
): ReadRefusal | null {
  const cells = tables.flatMap(({ table }) => table.rows.flatMap((row) => row.cells));
  const filled = cells.some(
    (cell) => cell !== null && isAmount(cell) && (cell.amount === null || !cell.amount.isZero()),
  );
  if (filled) return null;
  const pictured = sheets.find(({ pictures }) => pictures.length > 0);
  const [corner] = pictured?.pictures ?? [];
  if (pictured && corner) return refusal('picture-only', { sheet: pictured.name, cell: corner });
  const unclear = sheets
    .flatMap(({ rows }) => [...rows.values()].flatMap((row) => [...row.values()]))
    .find(({ ambiguous }) => ambiguous);
  if (!unclear) return refusal('no-amounts');
  const place = { sheet: unclear.sheet, cell: cellName(unclear) };
  return refusal(
    'no-amounts',
    place,
    `texts such as '${unclear.text}' in ${place.sheet}!${place.cell} can be read as thousands or as decimals, and nothing in the file tells. Numbers need to be numbers, or to be written with two marks or none`,
  );
}

interface PlacedRun {
  readonly table: StatementTable;
  readonly run: Run;
  readonly rows: readonly PlacedRow[];
}

function placeTables(
  tables: readonly StatementTable[],
  settled: SettledColumns,
  asking: Asking,
): PlacedRun[] {
  return tables.flatMap((table) => {
    const isRead = settled.get(table)?.some(({ scenario }) => scenario === 'actual');
    if (table.isTrialBalance || !isRead) return [];
    return table.runs.map((run) => ({ table, run, rows: placeRows(table, run, asking) }));
  });
}

/** The cash flow adds depreciation back: it counts only where the income statement does not show it. */
function withoutDoubledDepreciation(facts: readonly TableFact[]): TableFact[] {
  const codes = new Set(['depreciation', 'amortisation', 'depreciation_and_amortisation']);
  const periodOf = (fact: TableFact) => `${fact.borrower ?? ''}|${fact.periodEnd}|${fact.months}`;
  const shown = new Set(
    facts.filter(({ code, run }) => run.part === 'income' && codes.has(code)).map(periodOf),
  );
  return facts.filter(
    (fact) => fact.run.part !== 'cash-flow' || !codes.has(fact.code) || !shown.has(periodOf(fact)),
  );
}

const placementsOf = (table: StatementTable, rows: readonly PlacedRow[]): RowPlacement[] =>
  rows
    .filter(({ read }) => read.hasAmounts)
    .map(({ read, code, reason }) => ({
      sheet: table.table.sheet.name,
      row: read.row.number,
      label: read.row.label,
      code,
      reason,
    }));
