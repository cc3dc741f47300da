/** What is worth saying of a file that hinders nothing. */
import type { Asking } from './asking.ts';
import { cellName, type SheetCell, type SheetGrid } from './cells.ts';
import { quoted } from './drawnText.ts';
import type { TableFact } from './facts.ts';
import { rowPlace, type StatementTable } from './statements.ts';

export function noteContents(
  sheets: readonly SheetGrid[],
  tables: readonly StatementTable[],
  facts: readonly TableFact[],
  asking: Asking,
): void {
  for (const table of tables) {
    noteColumns(table, asking);
    noteRows(table, asking);
  }
  noteHiddenSheets(facts, asking);
  for (const sheet of sheets) noteComments(sheet, asking);
  const hasCashFlow = tables.some(({ runs }) =>
    runs.some(
      ({ part, rows }) =>
        part === 'cash-flow' && rows.some(({ line }) => line === 'cfo' || line === 'net_change_in_cash'),
    ),
  );
  if (!hasCashFlow) asking.note('no-cash-flow', 'The file has no cash flow statement.');
}

function noteColumns({ table, columns }: StatementTable, asking: Asking): void {
  const where = { sheet: table.sheet.name, cell: 'A1' };
  const other = columns.filter(({ role, scenario }) => role === 'period' && scenario !== 'actual');
  if (other.length > 0) {
    asking.note(
      'scenario-columns',
      `Budget or forecast columns were kept apart: ${other.map(({ key }) => key).join(', ')}.`,
      where,
    );
  }
  const derived = columns.filter(({ role }) => role === 'derived');
  if (derived.length > 0) {
    asking.note(
      'derived-columns-ignored',
      `Columns worked out from others were left out: ${derived.map(({ key }) => key).join(', ')}.`,
      where,
    );
  }
  const indexed = columns.find((column) => column.indexed);
  if (indexed) {
    asking.note(
      'index-adjusted',
      `Columns restated for a price index were left out, first '${indexed.heading}': no trend runs across them.`,
      where,
    );
  }
  noteStated(table, asking);
  const inWeeks = columns.find(({ period }) => period.weeks !== null);
  if (inWeeks) asking.note('week-year', `Periods are counted in weeks: '${inWeeks.heading}'.`, where);
}

/** What a table says of its status and its basis: the analyst enters both, and sees here what the file says. */
const STATED = [
  [
    'status-stated',
    /(?<![a-z])(?:un-?audited|audited|reviewed by|draft|preliminary|(?:un)?gepr[üu]ft|vorl[äa]ufig|entwurf|(?:non )?audit[ée]e?s?|provisoire|(?:no )?auditad[oa]s?|provisional|borrador)(?![a-z])/i,
    'The file says of its status',
  ],
  [
    'basis-stated',
    /(?<![a-z])(?:ifrs|hgb|us[ -]?gaap|uk[ -]?gaap|frs ?10[12]|local gaap|consolidated|stand-?alone|konzern\w*|konsolidiert|consolid[ée]s?|consolidad[oa]s?|individual(?:es)?|discontinued operations)(?![a-z])/i,
    'The file says of its basis',
  ],
  [
    'index-adjusted',
    /hyperinflation|ias ?29|inflation[ -](?:adjusted|restated|accounting)/i,
    'Figures are restated for a price index',
  ],
] as const;

function noteStated(table: StatementTable['table'], asking: Asking): void {
  const headings = table.columns.flatMap((column) => column.headings);
  const cells = [...table.titles, ...headings, ...table.footnotes].filter(({ kind }) => kind === 'text');
  for (const [code, words, says] of STATED) {
    const stated = cells.filter(({ text }) => words.test(text));
    const [first] = stated;
    if (!first) continue;
    const texts = [...new Set(stated.map(({ text }) => text.trim()))];
    asking.note(code, `${says}: ${quoted(texts)}.`, { sheet: first.sheet, cell: cellName(first) });
  }
}

function noteRows({ table, runs }: StatementTable, asking: Asking): void {
  const cells = table.rows.flatMap((row) => row.cells.flatMap((cell) => cell ?? []));
  noteDoubtful(cells, asking);
  const texts = cells.filter(({ fromText }) => fromText);
  const [first] = texts;
  if (first) {
    asking.note('text-numbers', `${texts.length} figures are stored as text. They were converted.`, {
      sheet: first.sheet,
      cell: cellName(first),
    });
  }
  if (runs.some(({ signed }) => signed.costsNegative || signed.liabilitiesNegative)) {
    asking.note(
      'costs-negative',
      `Costs or creditors on '${table.sheet.name}' are written as negative figures. They were turned as a block; the totals agree with it.`,
      { sheet: table.sheet.name, cell: 'A1' },
    );
  }
  for (const { rows } of runs) {
    for (const { line, row } of rows) {
      const isFilled = row.cells.some((cell) => cell?.kind === 'amount' && cell.amount?.isZero() === false);
      if (line !== 'balancing_item' || !isFilled) continue;
      asking.note(
        'plug-line',
        `The line '${row.label}' makes the sums come out. Ask what it stands for.`,
        rowPlace(table, row),
      );
    }
  }
}

function noteHiddenSheets(facts: readonly TableFact[], asking: Asking): void {
  for (const { table, cell } of facts) {
    const { sheet } = table.table;
    if (!sheet.hidden) continue;
    asking.note('hidden-sheet-read', `Figures were read from the hidden sheet '${sheet.name}'.`, {
      sheet: sheet.name,
      cell,
    });
  }
}

function noteComments({ name, comments }: SheetGrid, asking: Asking): void {
  const [first] = comments;
  if (!first) return;
  const texts = comments.map(({ cell, text }) => `${cell}: ${text}`);
  asking.note('comments', `Comments on '${name}' were not read as figures: ${quoted(texts)}.`, {
    sheet: name,
    cell: first.cell,
  });
}

function noteDoubtful(cells: readonly SheetCell[], asking: Asking): void {
  const ambiguous = cells.filter((cell) => cell.ambiguous);
  const [first] = ambiguous;
  if (first) {
    asking.note(
      'ambiguous-numbers',
      `${ambiguous.length} texts such as '${first.text}' in ${first.sheet}!${cellName(first)} can be read as thousands or as decimals, and nothing in the file tells. They were not read.`,
      { sheet: first.sheet, cell: cellName(first) },
    );
  }
  const stale = cells.filter(({ recomputed }) => recomputed !== null);
  const [example] = stale;
  if (example) {
    asking.note(
      'stale-values',
      `${stale.length} stored values are not what their formulas give, first ${example.sheet}!${cellName(example)}: ${example.text} is stored, ${example.recomputed?.toFixed() ?? ''} is worked out. The stored values were read. Ask for the file recalculated.`,
      { sheet: example.sheet, cell: cellName(example) },
    );
  }
}
