/** Gives each row of a table its part of the statements, its section and, where its wording is known, its line. */
import { isAmount } from './segments.ts';
import { type Table, type TableRow } from './tables.ts';
import { lineOf, partOfTitle, PARTS, sectionOfHeading, type Part } from './labels.ts';
import type { Line, Section } from './wordings/lines.ts';

export interface ReadRow {
  readonly row: TableRow;
  readonly part: Part | null;
  readonly section: Section | null;
  readonly line: Line | null;
  /** 'of which': already in the row above. */
  readonly ofWhich: boolean;
  readonly hasAmounts: boolean;
}

const OF_WHICH =
  /^\s*(?:[-–•]\s*)?(?:of which|thereof|davon|dont|de los cuales|de las cuales|including|incl\.|varav|waarvan)(?![a-z])/i;

/** Where a section ends: its total. */
const SECTION_OF_TOTAL: Readonly<Partial<Record<Line, Section>>> = {
  current_assets: 'current-assets',
  total_non_current_assets: 'non-current-assets',
  equity: 'equity',
  current_liabilities: 'current-liabilities',
  total_non_current_liabilities: 'non-current-liabilities',
  total_liabilities: 'liabilities',
  cfo: 'operating',
  cfi: 'investing',
  cff: 'financing',
};
const PART_OF_SECTION = (section: Section): Part =>
  ['operating', 'investing', 'financing'].includes(section) ? 'cash-flow' : 'balance';

/** `placed` holds the analyst's answers: the line of a label. */
export function readRows(table: Table, placed: (row: TableRow) => Line | null): ReadRow[] {
  const rows: ReadRow[] = [];
  let part = partOfTable(table);
  let section: Section | null = null;
  table.rows.forEach((row, index) => {
    const hasAmounts = row.cells.some((cell) => cell !== null && isAmount(cell));
    if (!hasAmounts) {
      const heading = headingOf(row, part);
      part = heading.part ?? part;
      section = heading.section ?? (heading.part ? null : section);
      rows.push({ row, part, section, line: null, ofWhich: false, hasAmounts });
      return;
    }
    const found = lineOfRow(table, row, index, part, section);
    const answered = placed(row);
    part = found.part;
    rows.push({
      row,
      part,
      section: found.section,
      line: answered ?? found.line,
      ofWhich: OF_WHICH.test(row.label),
      hasAmounts,
    });
    if (found.line && SECTION_OF_TOTAL[found.line] === section) section = null;
    if (found.line === 'total_assets') section = null;
  });
  return rows;
}

function headingOf(row: TableRow, part: Part | null): { part: Part | null; section: Section | null } {
  if (row.cells.some((cell) => cell !== null) || row.label === '') return { part: null, section: null };
  const section = sectionOfHeading(row.label);
  if (section && (part === null || part === 'income' || PART_OF_SECTION(section) === part)) {
    return { part: part === 'income' || part === null ? PART_OF_SECTION(section) : null, section };
  }
  return { part: partOfTitle(row.label), section };
}

interface Found {
  readonly line: Line | null;
  readonly part: Part | null;
  readonly section: Section | null;
}

/** In the part at hand; else in the only other part that knows the wording, which then begins here. */
function lineOfRow(
  table: Table,
  row: TableRow,
  index: number,
  part: Part | null,
  section: Section | null,
): Found {
  const asked = PARTS.filter((candidate) => part === null || candidate === part);
  for (const candidate of asked) {
    const at = sectionAt(table, index, candidate, section);
    const line = lineOf(row.label, candidate, at);
    if (line) return { line, part: candidate, section: at };
  }
  if (part === null) return { line: null, part, section };
  const others = PARTS.filter((candidate) => candidate !== part).flatMap((candidate) => {
    const line = lineOf(row.label, candidate, null);
    return line && line !== 'memo' && line !== 'balancing_item'
      ? [{ line, part: candidate, section: null }]
      : [];
  });
  const [only] = others;
  if (others.length === 1 && only && fitsBelow(table, index, only.part, part)) return only;
  return { line: null, part, section: sectionAt(table, index, part, section) };
}

/** One stray wording of another part is no new statement: the next known row must be of that part too. */
function fitsBelow(table: Table, index: number, part: Part, current: Part): boolean {
  for (const row of table.rows.slice(index + 1, index + 6)) {
    const own = lineOf(row.label, part, null);
    const old = lineOf(row.label, current, null);
    if (own && !old) return true;
    if (old && !own) return false;
  }
  return index + 1 >= table.rows.length;
}

/** A heading such as 'Equity and liabilities' covers several sections: the next total says which one a row is in. */
function sectionAt(table: Table, index: number, part: Part, section: Section | null): Section | null {
  if (section && section !== 'assets' && section !== 'liabilities') return section;
  return sectionBelow(table, index, part) ?? section;
}

/** What is left of a side once one of its two sections has had its total. */
const REST_OF_SIDE: readonly (readonly [total: Line, section: Line, rest: Section])[] = [
  ['total_assets', 'current_assets', 'non-current-assets'],
  ['total_assets', 'total_non_current_assets', 'current-assets'],
  ['total_liabilities', 'current_liabilities', 'non-current-liabilities'],
  ['total_liabilities', 'total_non_current_liabilities', 'current-liabilities'],
];

function restOfSide(table: Table, index: number, part: Part, total: Line): Section | null {
  const above = table.rows.slice(0, index).map(({ label }) => lineOf(label, part, null));
  const last = above.findLast(
    (line) => line !== null && REST_OF_SIDE.some(([, section]) => section === line),
  );
  return REST_OF_SIDE.find(([side, section]) => side === total && section === last)?.[2] ?? null;
}

/** Without a heading above, the next total below says which section a row is in. */
function sectionBelow(table: Table, index: number, part: Part): Section | null {
  if (part === 'income') return null;
  for (const row of table.rows.slice(index + 1)) {
    if (row.cells.every((cell) => cell === null)) {
      if (sectionOfHeading(row.label) || partOfTitle(row.label)) return null;
      continue;
    }
    const line = lineOf(row.label, part, null);
    const section = line && SECTION_OF_TOTAL[line];
    if (section && section !== 'liabilities') return section;
    if (line === 'total_assets' || line === 'total_liabilities') return restOfSide(table, index, part, line);
    if (line === 'total_equity_and_liabilities') return null;
  }
  return null;
}

/** By the nearest title that names a statement, else by the sheet's name, else by the first rows. */
function partOfTable(table: Table): Part | null {
  for (const title of [...table.titles].reverse()) {
    const part = partOfTitle(title.text);
    if (part) return part;
  }
  const named = partOfTitle(table.sheet.name);
  if (named) return named;
  const first = table.rows.filter(({ cells }) => cells.some((cell) => cell !== null)).slice(0, 8);
  const known = (part: Part) => first.filter(({ label }) => lineOf(label, part, null) !== null).length;
  const ranked = PARTS.map((part) => ({ part, count: known(part) })).sort(
    (one, other) => other.count - one.count,
  );
  return ranked[0] && ranked[0].count > 0 ? ranked[0].part : null;
}
