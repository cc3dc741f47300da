/** One unit and one currency for each table: its own words, those of its sheet or workbook, shared figures, else asked. */
import type { Decimal } from '#core/money/decimal.ts';
import type { CellRef, Question } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import { cellName, type WorkbookGrid } from './cells.ts';
import type { Unit } from './scale.ts';
import { readScaleText } from './scaleText.ts';
import type { StatementTable } from './statements.ts';
import type { Line } from './wordings/lines.ts';

export interface SettledScale {
  readonly unit: Unit | null;
  readonly currency: string | null;
  /** Keys of the questions that are open. */
  readonly waitsFor: readonly string[];
  /** The table is in another currency than the one that was chosen: amounts are never translated here. */
  readonly leftOut: boolean;
}

export interface ScaleContext {
  readonly lastQuarterRevenue: string | null;
  readonly reportingCurrency: string | null;
}

const UNIT_OPTIONS: Question['options'] = [
  { value: '1', label: 'Units' },
  { value: '1000', label: 'Thousands' },
  { value: '1000000', label: 'Millions' },
];

export function settleScales(
  grid: WorkbookGrid,
  tables: readonly StatementTable[],
  context: ScaleContext,
  asking: Asking,
): ReadonlyMap<StatementTable, SettledScale> {
  const units = unitsOf(grid, tables, context, asking);
  const currency = currencyOf(grid, tables, context, asking);
  const used = new Set([...units.values()].flatMap(({ unit }) => unit ?? []));
  if (used.size > 1) {
    asking.note('mixed-scale', 'Sheets are in different units. Each was read in the unit that it states.');
  }
  return new Map(
    tables.map((table) => {
      const own = units.get(table) ?? { unit: null, waitsFor: [] };
      return [
        table,
        {
          unit: own.unit,
          currency,
          waitsFor: [...own.waitsFor, ...(currency ? [] : ['currency'])],
          leftOut: currency !== null && table.scale.currency !== null && table.scale.currency !== currency,
        },
      ];
    }),
  );
}

type OwnUnit = { readonly unit: Unit | null; readonly waitsFor: readonly string[] };

function unitsOf(
  grid: WorkbookGrid,
  tables: readonly StatementTable[],
  context: ScaleContext,
  asking: Asking,
): Map<StatementTable, OwnUnit> {
  const known = new Map<StatementTable, Unit>();
  const learn = (table: StatementTable, unit: Unit | null | undefined) => {
    if (unit && !known.has(table) && !table.scale.contradicted) known.set(table, unit);
  };
  for (const table of tables) learn(table, table.scale.unit);
  for (const table of tables) {
    learn(
      table,
      tables.find((other) => other.table.sheet === table.table.sheet && known.has(other))?.scale.unit,
    );
  }
  const everywhere = statedForAll(grid);
  for (const table of tables) learn(table, everywhere);
  for (let round = 0; round < tables.length; round += 1) {
    for (const table of tables) learn(table, unitByFigures(table, known));
  }
  const open = tables.filter((table) => !known.has(table));
  const result = new Map<StatementTable, OwnUnit>(
    [...known].map(([table, unit]) => [table, { unit, waitsFor: [] }]),
  );
  if (open.length === 0) return result;
  if (open.length === tables.length) {
    const answer = askUnit('unit', open, context, asking);
    for (const table of open) result.set(table, answer);
    return result;
  }
  for (const table of open)
    result.set(table, askUnit(`unit:${table.table.sheet.name}`, [table], context, asking));
  return result;
}

/** 'All figures in EUR thousand', or the only unit on a sheet that has no table, such as a cover. */
function statedForAll(grid: WorkbookGrid): Unit | null {
  const units = new Set<Unit>();
  for (const sheet of grid.sheets) {
    const cells = [...sheet.rows.values()].flatMap((row) => [...row.values()]);
    const isCover = cells.every(({ kind }) => kind !== 'amount');
    for (const cell of cells) {
      if (cell.kind !== 'text') continue;
      const forAll = isCover || /(?<![a-z])(?:all|alle|tous|todos|toutes|todas)(?![a-z])/i.test(cell.text);
      const says = readScaleText(cell.text);
      if (forAll && says.unit !== null && !says.weak) units.add(says.unit);
    }
  }
  const [only] = units;
  return units.size === 1 && only ? only : null;
}

/** Figures that two statements share: the result begins the cash flow, the cash ends it. */
const SHARED: readonly (readonly [Line, Line])[] = [
  ['net_income', 'operating_adjustment'],
  ['profit_before_tax', 'operating_adjustment'],
  ['ebit', 'operating_adjustment'],
  ['cash', 'closing_cash'],
  ['cash', 'opening_cash'],
];

function unitByFigures(table: StatementTable, known: ReadonlyMap<StatementTable, Unit>): Unit | null {
  for (const [other, unit] of known) {
    for (const [one, two] of SHARED) {
      if (shareFigure(table, one, other, two) || shareFigure(table, two, other, one)) return unit;
    }
  }
  return null;
}

/** Two amounts of four digits or more, so that they do not agree by chance. */
function shareFigure(table: StatementTable, line: Line, other: StatementTable, otherLine: Line): boolean {
  const own = amountsOf(table, line);
  const shared = amountsOf(other, otherLine).filter(
    (amount) => amount.abs().gte(1000) && own.some((value) => value.eq(amount)),
  );
  return shared.length > 0;
}

const amountsOf = (table: StatementTable, line: Line): Decimal[] =>
  table.runs.flatMap((run) =>
    run.rows.flatMap((row, at) =>
      row.line === line ? (run.amounts[at] ?? []).flatMap((amount) => amount ?? []) : [],
    ),
  );

function askUnit(
  key: string,
  tables: readonly StatementTable[],
  context: ScaleContext,
  asking: Asking,
): OwnUnit {
  const shown = firstAmount(tables, 'revenue') ?? firstAmount(tables, 'total_assets');
  const last = context.lastQuarterRevenue
    ? ` Revenue of the last accepted quarter was ${grouped(context.lastQuarterRevenue)}.`
    : '';
  const sheets = [...new Set(tables.map(({ table }) => `'${table.sheet.name}'`))].join(', ');
  const answer = asking.ask({
    key,
    kind: 'unit',
    holdsFor: 'layout',
    text: `Nothing on ${sheets} says whether amounts are in units, thousands or millions.${last}${shown ? ` The file shows ${shown.text}.` : ''}`,
    where: shown ? [shown.where] : [],
    options: UNIT_OPTIONS,
  });
  return answer === null ? { unit: null, waitsFor: [key] } : { unit: Number(answer) as Unit, waitsFor: [] };
}

const grouped = (amount: string): string => amount.replace(/\B(?=(\d{3})+(?!\d))/g, ',');

function firstAmount(tables: readonly StatementTable[], line: Line): { text: string; where: CellRef } | null {
  for (const { runs } of tables) {
    for (const row of runs.flatMap(({ rows }) => rows)) {
      const cell = row.line === line ? row.row.cells.find((candidate) => candidate?.kind === 'amount') : null;
      if (cell)
        return {
          text: `${row.row.label} of ${cell.text}`,
          where: { sheet: cell.sheet, cell: cellName(cell) },
        };
    }
  }
  return null;
}

const SHARERS: Readonly<Record<string, readonly string[]>> = {
  $: ['USD', 'CAD', 'AUD', 'NZD', 'SGD', 'HKD', 'MXN'],
  kr: ['SEK', 'NOK', 'DKK', 'ISK'],
  '¥': ['JPY', 'CNY'],
  'Fr.': ['CHF'],
};
const USUAL_CURRENCIES = ['EUR', 'USD', 'GBP', 'CHF', 'SEK', 'NOK', 'DKK', 'PLN'];

const inSeveral = (stated: ReadonlySet<string>): boolean => stated.size > 1;

/** A sign that several currencies share is always asked the first time; then it is known for the layout. */
function currencyOf(
  grid: WorkbookGrid,
  tables: readonly StatementTable[],
  context: ScaleContext,
  asking: Asking,
): string | null {
  const stated = new Set(
    tables.flatMap(({ scale, columns }) => [
      ...(scale.currency === null ? [] : [scale.currency]),
      ...columns.flatMap((column) => (column.role === 'period' ? (column.currency ?? []) : [])),
    ]),
  );
  const contradicted = tables.some(({ scale }) => scale.contradicted && scale.currency === null);
  if (stated.size === 0 && !contradicted) {
    for (const sheet of grid.sheets) {
      for (const row of sheet.rows.values()) {
        for (const cell of row.values()) {
          const currency =
            cell.kind === 'text' && cell.column <= 3 ? readScaleText(cell.text).currency : null;
          if (currency) stated.add(currency);
        }
      }
    }
  }
  const [only] = stated;
  if (stated.size === 1 && only && !contradicted) return only;
  const sign = tables.map(({ scale }) => scale.sharedSign).find((shared) => shared !== null) ?? null;
  const likely = [...stated, ...(sign ? (SHARERS[sign] ?? []) : []), ...USUAL_CURRENCIES];
  const codes = [
    ...new Set(context.reportingCurrency ? [context.reportingCurrency, ...likely] : likely),
  ].slice(0, 8);
  const where = tables.flatMap(({ scale }) => scale.where ?? []).slice(0, 1);
  return asking.ask({
    key: 'currency',
    kind: 'currency',
    holdsFor: 'layout',
    text: inSeveral(stated)
      ? `The file holds figures in ${[...stated].join(' and ')}. Which one is the reporting currency? The others are left out, and nothing is translated.`
      : sign
        ? `The file says '${sign}', which several currencies share. Which one is it?`
        : 'No sheet says which currency the amounts are in. Which one is it?',
    where,
    options: codes.map((code) => ({ value: code, label: code })),
    accepts: (given) => /^[A-Z]{3}$/.test(given),
  });
}
