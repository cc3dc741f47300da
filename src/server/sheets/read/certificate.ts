/**
 * Compliance certificates: statements of the borrower about its covenants, never its accounts. Their add-backs are
 * listed, and their EBITDA before add-backs is held against that of the accounts.
 */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { identity } from '#core/statements/identities.ts';
import type { ReadAddBack, ReadCheck } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import { cellName } from './cells.ts';
import type { TableFact } from './facts.ts';
import { columnPeriod, type PeriodEvidence } from './periods.ts';
import { plainText } from './plainWords.ts';
import { isAmount } from './segments.ts';
import type { StatementTable } from './statements.ts';
import type { TableRow } from './tables.ts';
import type { SettledScale } from './units.ts';

const TITLE =
  /(?<![a-z])(?:(?:compliance|covenant|officers?|directors?) ?-?(?:compliance )?certificate|certificate of compliance|covenant compliance|compliance[ -]?(?:zertifikat|bescheinigung)|covenant[ -]?bescheinigung|certificat de conformite|attestation de conformite|certificado de cumplimiento)(?![a-z])/;
const EBITDA = /(?<![a-z])ebitda(?![a-z])/;
const AFTER =
  /(?<![a-z])(?:adjusted|covenant|consolidated adjusted|after|pro forma|normalised|normalized|bereinigt\w*|ajuste|ajustado|retraite)(?![a-z])/;
const TOTAL = /^\s*(?:total|sum|summe|gesamt|suma|of which|davon|dont)(?![a-z])/;

export const isCertificate = ({ table }: StatementTable): boolean =>
  [table.sheet.name, ...table.titles.map(({ text }) => text)].some((text) => TITLE.test(plainText(text)));

export interface Certificate {
  readonly addBacks: readonly ReadAddBack[];
  readonly checks: readonly ReadCheck[];
}

export function readCertificate(
  certificate: StatementTable,
  scale: SettledScale,
  evidence: PeriodEvidence,
  facts: readonly TableFact[],
  asking: Asking,
): Certificate {
  const { sheet } = certificate.table;
  asking.note(
    'certificate-read',
    `'${sheet.name}' is a compliance certificate. It was read as a statement of the borrower, not as accounts.`,
    { sheet: sheet.name, cell: 'A1' },
  );
  const rows = certificate.table.rows;
  const before = rows.findIndex((row) => isEbitda(row) && !AFTER.test(plainText(row.label)));
  const after = rows.findIndex((row, at) => at > before && isEbitda(row));
  const periods = certificate.columns
    .filter(({ role, scenario }) => role === 'period' && scenario === 'actual')
    .flatMap((words) => {
      const { end, months } = columnPeriod(words, certificate.title, evidence);
      const length = months ?? certificate.title.months;
      return end && length !== null ? [{ index: words.index, end, months: length }] : [];
    });
  if (before < 0) return { addBacks: [], checks: [] };
  const between =
    after < 0 ? [] : rows.slice(before + 1, after).filter((row) => !TOTAL.test(plainText(row.label)));
  return {
    addBacks: periods.flatMap((period) => between.flatMap((row) => addBackOf(row, period, scale, asking))),
    checks: periods.flatMap((period) => checkOfEbitda(rows[before] as TableRow, period, scale, facts)),
  };
}

const isEbitda = (row: TableRow): boolean =>
  EBITDA.test(plainText(row.label)) &&
  !/margin|ratio|\/|:|cover|leverage/.test(plainText(row.label)) &&
  row.cells.some((cell) => cell !== null && isAmount(cell));

interface CertifiedPeriod {
  readonly index: number;
  readonly end: string;
  readonly months: number;
}

function addBackOf(
  row: TableRow,
  { index, end, months }: CertifiedPeriod,
  scale: SettledScale,
  asking: Asking,
): ReadAddBack[] {
  const cell = row.cells[index];
  if (cell?.kind !== 'amount' || !cell.amount || cell.amount.isZero()) return [];
  return [
    {
      periodEnd: end,
      months,
      amount: cell.amount.times(scale.unit ?? 1).toFixed(),
      sheet: cell.sheet,
      cell: cellName(cell),
      rawText: cell.text.slice(0, 120),
      label: row.label.slice(0, 255),
      waitsFor: scale.waitsFor.filter((key) => asking.isOpen(key)),
    },
  ];
}

function checkOfEbitda(
  row: TableRow,
  { index, end, months }: CertifiedPeriod,
  scale: SettledScale,
  facts: readonly TableFact[],
): ReadCheck[] {
  const stated = row.cells[index]?.amount?.times(scale.unit ?? 1);
  const own = ebitdaOf(facts, end, months);
  if (!stated || !own) return [];
  const revenue = sumOver(facts, 'revenue', end, months) ?? own.abs();
  const result = identity({
    given: stated,
    parts: [own],
    reference: revenue,
    roundingUnit: decimal(scale.unit ?? 1),
  });
  return [
    {
      code: 'certificate-ebitda',
      text: "The certificate's EBITDA before add-backs against that of the accounts",
      outcome: result.outcome,
      difference: result.difference.toFixed(),
      tolerance: result.tolerance.toFixed(),
      periodEnd: end,
      months,
    },
  ];
}

/** As the accounts state it, else operating profit with depreciation and amortisation added back. */
function ebitdaOf(facts: readonly TableFact[], end: string, months: number): Decimal | null {
  const stated = sumOver(facts, 'ebitda_reported', end, months);
  if (stated) return stated;
  const ebit = sumOver(facts, 'ebit', end, months);
  const written = (
    ['depreciation', 'amortisation', 'depreciation_and_amortisation', 'impairment'] as const
  ).flatMap((code) => sumOver(facts, code, end, months) ?? []);
  return ebit && written.length > 0 ? written.reduce((sum, amount) => sum.plus(amount), ebit) : null;
}

/** The line over the same months: of one column, or of quarters that make them up. */
function sumOver(
  facts: readonly TableFact[],
  code: TableFact['code'],
  end: string,
  months: number,
): Decimal | null {
  const of = (at: string, length: number) =>
    facts.filter((fact) => fact.code === code && fact.periodEnd === at && fact.months === length);
  const total = (found: readonly TableFact[]) =>
    found.reduce((sum, { amount }) => sum.plus(amount), decimal(0));
  const whole = of(end, months);
  if (whole.length > 0) return total(whole);
  if (months % 3 !== 0) return null;
  const quarters = Array.from({ length: months / 3 }, (_, back) => of(monthEndBefore(end, back * 3), 3));
  return quarters.every((found) => found.length > 0) ? total(quarters.flat()) : null;
}

function monthEndBefore(end: string, months: number): string {
  const [year, month] = end.split('-').map(Number) as [number, number];
  return new Date(Date.UTC(year, month - months, 0)).toISOString().slice(0, 10);
}
