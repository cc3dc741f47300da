/** The unit and currency of each table: stated in its own words, in its formats, or for the whole workbook. */
import { decimal } from '#core/money/decimal.ts';
import type { CellRef } from '#core/statements/workbookReading.ts';
import { cellName, type SheetCell } from './cells.ts';
import { currencyOfFormat, readScaleText, type ScaleText } from './scaleText.ts';
import type { Table } from './tables.ts';

export type Unit = 1 | 1000 | 1_000_000;

export interface TableScale {
  readonly unit: Unit | null;
  readonly currency: string | null;
  /** '$' or 'kr' alone. */
  readonly sharedSign: string | null;
  /** Where it is stated, or where the table begins. */
  readonly where: CellRef | null;
  /** Two statements that contradict each other. */
  readonly contradicted: boolean;
}

/** 'in EUR' alone is believed where the figures are as large as whole units are. */
const WHOLE_UNITS_FROM = decimal(1_000_000);
/** Cents are printed of whole units, not of thousands. */
const CENTS_PROVE_FROM = decimal(100_000);

export function tableScale(table: Table): TableScale {
  const texts = [
    ...table.columns.flatMap(({ headings }) => headings),
    ...[...table.titles].reverse(),
    ...table.footnotes,
  ];
  const stated = texts.map((cell) => ({ cell, says: readScaleText(cell.text) }));
  const units = distinct(stated.flatMap(({ says }) => (says.unit !== null && !says.weak ? [says.unit] : [])));
  const currencies = distinct([
    ...stated.flatMap(({ says }) => says.currency ?? []),
    ...formatsOf(table).flatMap(({ currency }) => currency ?? []),
  ]);
  const signs = [
    ...stated.flatMap(({ says }) => says.sharedSign ?? []),
    ...formatsOf(table).flatMap(({ sharedSign }) => sharedSign ?? []),
  ];
  const source = stated.find(({ says }) => says.unit !== null)?.cell ?? texts[0] ?? null;
  return {
    unit: units.length === 1 ? (units[0] ?? null) : units.length === 0 ? provenUnit(table, stated) : null,
    currency: currencies.length === 1 ? (currencies[0] ?? null) : null,
    sharedSign: signs[0] ?? null,
    where: source && { sheet: source.sheet, cell: cellName(source) },
    contradicted: units.length > 1 || currencies.length > 1,
  };
}

const distinct = <Value>(values: readonly Value[]): Value[] => [...new Set(values)];

const amountCells = (table: Table): SheetCell[] =>
  table.rows.flatMap(({ cells }) => cells.flatMap((cell) => (cell?.kind === 'amount' ? [cell] : [])));

function provenUnit(table: Table, stated: readonly { says: ScaleText }[]): Unit | null {
  const cells = amountCells(table);
  const largest = cells.reduce(
    (most, { amount }) => (amount?.abs().gt(most) ? amount.abs() : most),
    decimal(0),
  );
  const scales = distinct(
    cells.filter(({ amount }) => !amount?.isZero()).map(({ formatScale }) => formatScale),
  );
  if (scales.length === 1 && (scales[0] === 1000 || scales[0] === 1_000_000)) return scales[0];
  const withCents = cells.filter(({ decimals }) => decimals === 2 || decimals === 1).length;
  if (
    largest.gte(CENTS_PROVE_FROM) &&
    withCents * 2 > cells.length &&
    cells.every(({ decimals }) => decimals <= 2)
  ) {
    if (cells.some(({ decimals }) => decimals === 2)) return 1;
  }
  if (stated.some(({ says }) => says.weak) && largest.gte(WHOLE_UNITS_FROM)) return 1;
  return null;
}

function formatsOf(table: Table): Pick<ScaleText, 'currency' | 'sharedSign'>[] {
  return distinct(amountCells(table).map(({ numberFormat }) => numberFormat)).map(currencyOfFormat);
}
