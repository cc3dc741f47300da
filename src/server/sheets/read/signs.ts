/** The sign of each row: by block, proven by the totals; single cells are never turned. */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { NEGATIVE_SHARE } from '#core/statements/costSigns.ts';
import { findSums, type SumFound, type SumRow } from './arithmetic.ts';
import {
  ASIDE,
  BARRIERS,
  CLOSES_ALL,
  CLOSES_SECTION,
  COST_LINES,
  EQUITY_LINES,
  FREE_SIGNS,
  isSubtotal,
  LIABILITY_LINES,
  OUTFLOW_LINES,
} from './lineNature.ts';
import type { ReadRow } from './rows.ts';
import type { Line } from './wordings/lines.ts';

export type Values = readonly (readonly (Decimal | null)[])[];

export interface Signed {
  readonly sums: SumFound;
  /** What to multiply the printed amount of a row with to get the stored one, if the row is placed on `line`. */
  readonly factorOf: (index: number, line: Line | null) => 1 | -1;
  /** Rows whose sign neither the block nor a sum settles. */
  readonly unsettled: ReadonlySet<number>;
  /** Rows that are losses by their words. */
  readonly losses: ReadonlySet<number>;
  readonly costsNegative: boolean;
  readonly liabilitiesNegative: boolean;
}

/** `rows` are one run of one part of the statements; `values` hold their amounts in the columns that count. */
export function signRows(rows: readonly ReadRow[], values: Values, step: Decimal): Signed {
  const part = rows.find((row) => row.part !== null)?.part;
  if (part === 'income') return signIncome(rows, values, step);
  if (part === 'cash-flow') return signCashFlow(rows, values, step);
  return signBalance(rows, values, step);
}

function sumRow(
  row: ReadRow,
  values: readonly (Decimal | null)[],
  sign: 1 | -1,
  eitherSign: boolean,
  before?: ReadRow,
): SumRow {
  const { line } = row;
  // 'Sales' below 'Sales north' and 'Sales south': rows without a line of their own, or of the same one.
  const followsItsParts = before?.hasAmounts === true && (before.line === null || before.line === line);
  const base = {
    values,
    sign,
    eitherSign,
    closes: 'nothing',
    barrier: line !== null && BARRIERS.has(line),
  } as const;
  if (!row.hasAmounts || row.ofWhich || (line !== null && ASIDE.has(line))) return { ...base, role: 'aside' };
  if (line !== null && isSubtotal(line)) {
    return {
      ...base,
      role: 'total',
      closes: CLOSES_ALL.has(line) ? 'all' : CLOSES_SECTION.has(line) ? 'since-total' : 'nothing',
    };
  }
  const saysTotal = /^\s*(?:total|sub-?total|sum(?:me)?|zwischensumme|sous-total|suma)(?![a-z])/i.test(
    row.row.label,
  );
  const couldBeSum = line === null || saysTotal || row.row.bold || followsItsParts;
  return { ...base, role: couldBeSum ? 'maybe' : 'part' };
}

/**
 * Costs that are negative in one column and positive in the others ('sign flips between years'): each column is a
 * block of its own, and those that are negative are turned. One cost alone turns nothing: it may be a credit.
 */
export function withEvenCosts(
  rows: readonly ReadRow[],
  printed: readonly (readonly (Decimal | null)[])[],
  columns: readonly number[],
): Values {
  const costs = rows.flatMap(({ line, part }, at) =>
    part === 'income' && line !== null && COST_LINES.has(line) && !FREE_SIGNS.has(line) ? [at] : [],
  );
  const shareOf = (column: number) => {
    const values = costs.flatMap((at) => printed[at]?.[column] ?? []).filter((value) => !value.isZero());
    return values.length < 2 ? null : shareNegative(values);
  };
  const shares = columns.map((column) => ({ column, share: shareOf(column) }));
  const negative = shares.filter(({ share }) => share !== null && share >= NEGATIVE_SHARE);
  const positive = shares.filter(({ share }) => share !== null && share <= 1 - NEGATIVE_SHARE);
  if (negative.length === 0 || positive.length === 0) return printed;
  const turned = new Set(negative.map(({ column }) => column));
  return printed.map((row, at) => {
    const { line } = rows[at] as ReadRow;
    if (line === null || !COST_LINES.has(line)) return row;
    return row.map((value, column) => (value && turned.has(column) ? value.neg() : value));
  });
}

function signIncome(rows: readonly ReadRow[], printed: Values, step: Decimal): Signed {
  const of = (wanted: (line: Line) => boolean) =>
    rows.flatMap((row, at) => (row.line && wanted(row.line) ? (printed[at] ?? []) : []));
  /** Exports of ledgers write income as credit, negative. */
  const turned = shareNegative(of((line) => line === 'revenue')) >= NEGATIVE_SHARE ? -1 : 1;
  const values = turned === 1 ? printed : printed.map((row) => row.map((value) => value && value.neg()));
  const negativeShare = shareNegative(of((line) => COST_LINES.has(line)));
  const assumed = turned === 1 ? negativeShare >= NEGATIVE_SHARE : negativeShare <= 1 - NEGATIVE_SHARE;
  const isCost = (line: Line | null) => line !== null && COST_LINES.has(line);
  const attempt = (costsNegative: boolean) =>
    findSums(
      rows.map((row, at) => {
        const free = row.line === null || FREE_SIGNS.has(row.line) || (isSubtotal(row.line) && saysLoss(row));
        return sumRow(row, values[at] ?? [], isCost(row.line) && !costsNegative ? -1 : 1, free, rows[at - 1]);
      }),
      step,
    );
  const [first, second] = [attempt(assumed), attempt(!assumed)];
  const useSecond = second.sums.size > first.sums.size;
  const costsNegative = useSecond ? !assumed : assumed;
  const sums = useSecond ? second : first;
  return {
    sums,
    factorOf: (index, line) => {
      const contribution = sums.signs.get(index) ?? (isCost(line) && !costsNegative ? -1 : 1);
      return (turned * (isCost(line) ? -contribution : contribution)) as 1 | -1;
    },
    losses: lossesOf(rows),
    unsettled: unsettledOfIncome(rows, values, sums, costsNegative),
    costsNegative: costsNegative && turned === 1,
    liabilitiesNegative: false,
  };
}

/** 'Loss for the period', 'Jahresfehlbetrag', 'Verlustvortrag': a loss by its words alone, with or without a minus. */
const saysLoss = ({ row: { label } }: ReadRow): boolean =>
  /loss|verlust|fehlbetrag|perte|p[ée]rdida|d[ée]ficit/i.test(label) &&
  !/profit|gewinn|[üu]berschuss|ueberschuss|b[ée]n[ée]fice|beneficio|gain|income|result|earnings|ganancia|impair|before|\bof\b.*value|credit/i.test(
    label.replace(/before tax(?:es|ation)?|before interest|for the/gi, ''),
  );

const lossesOf = (rows: readonly ReadRow[]): ReadonlySet<number> =>
  new Set(rows.flatMap((row, at) => (saysLoss(row) ? [at] : [])));

/** Gains by their own words; 'Exceptional items' and 'Restructuring costs' may be written either way. */
const SAYS_GAIN = /income|gain|profit|ertr[äa]g|produit|ingreso|beneficio/i;

/**
 * Rows that no total proves and whose sign is not that of the block: a cost with a minus among costs without one, and
 * an exceptional figure without a minus, which may raise or lower the result.
 */
function unsettledOfIncome(
  rows: readonly ReadRow[],
  values: Values,
  sums: SumFound,
  costsNegative: boolean,
): ReadonlySet<number> {
  return new Set(
    rows.flatMap((row, at) => {
      const filled = (values[at] ?? []).filter((value) => value !== null && !value.isZero());
      if (sums.signs.has(at) || filled.length === 0 || row.line === null || row.ofWhich) return [];
      const isNegative = filled.every((value) => value?.isNegative());
      if (isSubtotal(row.line)) return saysLoss(row) && !isNegative ? [at] : [];
      if (row.line === 'other_non_operating') {
        return !isNegative && !SAYS_GAIN.test(row.row.label) ? [at] : [];
      }
      const isBlock = COST_LINES.has(row.line) && !costsNegative && !isSubtotal(row.line);
      return isBlock && isNegative ? [at] : [];
    }),
  );
}

function signCashFlow(rows: readonly ReadRow[], values: Values, step: Decimal): Signed {
  const positiveOutflow = (at: number) => {
    const line = rows[at]?.line;
    const filled = (values[at] ?? []).filter((value) => value !== null && !value.isZero());
    return (
      line && OUTFLOW_LINES.has(line) && filled.length > 0 && filled.every((value) => value?.isPositive())
    );
  };
  const saysUsed = (row: ReadRow) => /used|outflow|abfluss|utilis/i.test(row.row.label);
  const onlyUsed = (row: ReadRow) =>
    saysUsed(row) && !/inflow|from|provided|generated|[(/]\s*(?:used|outflow)|zufluss/i.test(row.row.label);
  const usedWithoutMinus = (row: ReadRow, at: number) =>
    row.line !== null &&
    onlyUsed(row) &&
    (values[at] ?? []).some((value) => value !== null && !value.isZero()) &&
    (values[at] ?? []).every((value) => value === null || !value.isNegative());
  const sums = findSums(
    rows.map((row, at) => {
      const free = row.line === null || positiveOutflow(at) || (saysUsed(row) && isSubtotal(row.line));
      return sumRow(row, values[at] ?? [], 1, free === true, rows[at - 1]);
    }),
    step,
  );
  const unsettled = new Set(
    rows.flatMap((row, at) =>
      (positiveOutflow(at) || usedWithoutMinus(row, at)) && !sums.signs.has(at) ? [at] : [],
    ),
  );
  return {
    sums,
    factorOf: (index) => sums.signs.get(index) ?? 1,
    losses: new Set(),
    unsettled,
    costsNegative: false,
    liabilitiesNegative: false,
  };
}

const isLossOfEquity = (row: ReadRow): boolean => row.line === 'retained_earnings' && saysLoss(row);

const isPositive = (values: readonly (Decimal | null)[] = []): boolean =>
  values.some((value) => value !== null && !value.isZero()) &&
  values.every((value) => value === null || !value.isNegative());

function signBalance(rows: readonly ReadRow[], values: Values, step: Decimal): Signed {
  const sums = findSums(
    rows.map((row, at) => {
      const free = row.line === 'accumulated_depreciation' || isLossOfEquity(row);
      return sumRow(row, values[at] ?? [], 1, free, rows[at - 1]);
    }),
    step,
  );
  const of = (lines: ReadonlySet<Line>) =>
    rows.flatMap((row, at) => (row.line && lines.has(row.line) ? (values[at] ?? []) : []));
  const liabilitiesNegative = shareNegative(of(LIABILITY_LINES)) >= NEGATIVE_SHARE;
  const equityNegative =
    liabilitiesNegative && shareNegative(of(new Set<Line>(['total_equity_and_liabilities']))) === 1;
  const flips = (line: Line | null): boolean =>
    line !== null &&
    ((liabilitiesNegative && LIABILITY_LINES.has(line)) || (equityNegative && EQUITY_LINES.has(line)));
  return {
    sums,
    factorOf: (index, line) => {
      const row = rows[index];
      if (row && isLossOfEquity(row) && !equityNegative) return sums.signs.get(index) ?? 1;
      return flips(line) ? -1 : 1;
    },
    losses: lossesOf(rows),
    unsettled: new Set(
      rows.flatMap((row, at) =>
        isLossOfEquity(row) && isPositive(values[at]) && !sums.signs.has(at) ? [at] : [],
      ),
    ),
    costsNegative: false,
    liabilitiesNegative,
  };
}

/** Of the cells that are filled and not zero; 0 where there is none. */
function shareNegative(values: readonly (Decimal | null)[]): number {
  const filled = values.filter((value) => value !== null && !value.isZero());
  return filled.length === 0 ? 0 : filled.filter((value) => value?.isNegative()).length / filled.length;
}

/** The rounding unit that figures are printed with: 1 for whole figures, 0.1 for one decimal, 0.01 for cents. */
export function printedStep(values: readonly (Decimal | null)[]): Decimal {
  const filled = values.flatMap((value) => (value && !value.isZero() ? [value] : []));
  for (const places of [0, 1]) {
    const fine = filled.filter((value) => value.decimalPlaces() > places).length;
    if (fine * 20 <= filled.length) return decimal(10).pow(-places);
  }
  return decimal('0.01');
}
