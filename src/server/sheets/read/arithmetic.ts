/**
 * Finds by arithmetic which rows are sums of the rows before them, and with which sign each row goes into its sum.
 * A row that is a sum is never counted again; a row that goes into a proven sum has a proven sign.
 */
import { decimal, ZERO, type Decimal } from '#core/money/decimal.ts';

export interface SumRow {
  /** One for each column; null where the cell is blank. */
  readonly values: readonly (Decimal | null)[];
  /** +1 or -1: how the row goes into sums if nothing speaks against it. */
  readonly sign: 1 | -1;
  /** The sign is not known from the line: both are tried. */
  readonly eitherSign: boolean;
  /** 'total': must be a sum. 'maybe': could be. 'part': is none. 'aside': stands beside the chain. */
  readonly role: 'total' | 'maybe' | 'part' | 'aside';
  /** For a total that no sum explains: what came before it ends here, or it stands beside the chain ('nothing'). */
  readonly closes: 'all' | 'since-total' | 'nothing';
  /** Nothing before this row goes into sums after it. */
  readonly barrier: boolean;
}

export interface SumFound {
  /** Signs by row that were proven by a sum. */
  readonly signs: ReadonlyMap<number, 1 | -1>;
  /** Row to the rows that add up to it. */
  readonly sums: ReadonlyMap<number, readonly number[]>;
  /** Totals that their parts do not add up to, with the parts that should have. */
  readonly untied: ReadonlyMap<number, readonly number[]>;
  /** Untied totals that a wider sum proves wrong: the parts fit it, the total does not. */
  readonly contradicted: ReadonlySet<number>;
}

interface Term {
  readonly row: number;
  readonly values: readonly (Decimal | null)[];
  readonly eitherSign: boolean;
  readonly isTotal: boolean;
  /** What the parts of an untied total add up to. */
  readonly instead: readonly (Decimal | null)[] | null;
}

const MAX_FREE_SIGNS = 5;
const MAX_PARTS = 40;

/** `step` is the rounding unit of the printed figures: 1 where they are whole. */
export function findSums(rows: readonly SumRow[], step: Decimal): SumFound {
  const signs = new Map<number, 1 | -1>();
  const sums = new Map<number, readonly number[]>();
  const untied = new Map<number, readonly number[]>();
  const contradicted = new Set<number>();
  let terms: Term[] = [];
  rows.forEach((row, index) => {
    if (row.values.every((value) => value === null)) return;
    const own: Term = {
      row: index,
      values: signed(row.values, row.sign),
      eitherSign: row.eitherSign,
      isTotal: row.role === 'total',
      instead: null,
    };
    const match = row.role === 'part' || row.role === 'aside' ? null : matchOf(terms, row, step);
    if (match) {
      const parts = terms.slice(terms.length - match.count);
      sums.set(
        index,
        parts.map((part) => part.row),
      );
      signs.set(index, match.totalSign);
      parts.forEach((part, at) => {
        const flip = match.flips[at] ?? 1;
        const before = rows[part.row]?.sign ?? 1;
        signs.set(part.row, (before * flip) as 1 | -1);
        if (match.instead.has(part.row)) contradicted.add(part.row);
      });
      terms = [
        ...terms.slice(0, terms.length - match.count),
        { ...own, values: signed(row.values, match.totalSign), eitherSign: false, isTotal: true },
      ];
    } else if (row.role === 'total' && row.closes !== 'nothing') {
      const closed = closedBy(terms, row.closes);
      untied.set(
        index,
        closed.map((term) => term.row),
      );
      terms = [
        ...terms.slice(0, terms.length - closed.length),
        { ...own, instead: closed.length >= 2 ? total(closed, own.values.length) : null },
      ];
    } else if (row.role !== 'aside' && row.role !== 'total') terms.push(own);
    if (row.barrier) terms = [];
  });
  return { signs, sums, untied, contradicted };
}

/** Terms since the last total: that total itself begins a chain ('all'), and stands apart from a list of parts. */
function closedBy(terms: readonly Term[], closes: SumRow['closes']): readonly Term[] {
  const last = terms.map((term) => term.isTotal).lastIndexOf(true);
  return terms.slice(closes === 'all' ? Math.max(last, 0) : last + 1);
}

interface Match {
  readonly count: number;
  readonly totalSign: 1 | -1;
  readonly flips: readonly (1 | -1)[];
  readonly instead: ReadonlySet<number>;
}

/** The shortest run of terms just before the row that adds up to it in every column. */
function matchOf(terms: readonly Term[], row: SumRow, step: Decimal): Match | null {
  if (row.values.every((value) => value === null || value.isZero())) return null;
  // A section may have one row; a result that equals the row above it does so by chance.
  const least = row.role === 'total' && row.closes === 'since-total' ? 1 : 2;
  for (let count = least; count <= Math.min(terms.length, MAX_PARTS); count += 1) {
    const parts = terms.slice(terms.length - count);
    if (count > 1 && parts.filter(isNotZero).length < 2) continue;
    if (count === 1 && !isNotZero(parts[0])) continue;
    const match = matchOfParts(parts, row, step);
    if (match) return match;
  }
  return null;
}

const isNotZero = (term: Term | undefined): boolean =>
  term?.values.some((value) => value !== null && !value.isZero()) === true;

function matchOfParts(parts: readonly Term[], row: SumRow, step: Decimal): Match | null {
  const free = parts
    .flatMap((part, at) => (part.eitherSign && isNotZero(part) ? [at] : []))
    .slice(-MAX_FREE_SIGNS);
  const wrongTotals = parts.filter((part) => part.instead !== null);
  const tolerance = step.times(parts.length + 1).div(2);
  const totalSigns: readonly (1 | -1)[] = row.eitherSign ? [row.sign, (row.sign * -1) as 1 | -1] : [row.sign];
  for (let choice = 0; choice < 2 ** free.length; choice += 1) {
    const flips = parts.map((_, at) => ((choice >> free.indexOf(at)) & 1 && free.includes(at) ? -1 : 1));
    for (const useInstead of wrongTotals.length > 0 ? [false, true] : [false]) {
      for (const totalSign of totalSigns) {
        if (!fits(parts, flips, useInstead, signed(row.values, totalSign), tolerance)) continue;
        const instead = new Set(useInstead ? wrongTotals.map((part) => part.row) : []);
        return { count: parts.length, totalSign, flips, instead };
      }
    }
  }
  return null;
}

function fits(
  parts: readonly Term[],
  flips: readonly (1 | -1)[],
  useInstead: boolean,
  wanted: readonly (Decimal | null)[],
  tolerance: Decimal,
): boolean {
  let compared = 0;
  const fitsAll = wanted.every((value, column) => {
    if (value === null) return true;
    let sum = ZERO;
    let filled = 0;
    parts.forEach((part, at) => {
      const amount = (useInstead && part.instead ? part.instead : part.values)[column];
      if (!amount) return;
      sum = sum.plus(amount.times(flips[at] ?? 1));
      filled += 1;
    });
    if (filled === 0) return value.isZero();
    compared += 1;
    return sum.minus(value).abs().lte(tolerance);
  });
  return fitsAll && compared > 0;
}

const signed = (values: readonly (Decimal | null)[], sign: 1 | -1): readonly (Decimal | null)[] =>
  sign === 1 ? values : values.map((value) => value && value.neg());

function total(terms: readonly Term[], columns: number): readonly (Decimal | null)[] {
  return Array.from({ length: columns }, (_, column) => {
    const amounts = terms.flatMap((term) => term.values[column] ?? []);
    return amounts.length === 0 ? null : amounts.reduce((sum, amount) => sum.plus(amount), decimal(0));
  });
}
