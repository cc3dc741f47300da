/** Balances, quarters and twelve months read out of statements of whatever length the borrower sends. */
import { fiscalPosition, isSamePeriodEnd, lastYearEndBefore, monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { Decimal, ZERO } from '../money/decimal.ts';
import { basisRank } from './currentStatements.ts';
import { lineInputs } from './lineAmount.ts';
import type { LineItemCode } from './lineItems.ts';
import { sumOfInputs, sumOfReadings, type InputUsed, type Reading } from './reading.ts';
import type { Statement } from './statement.ts';
import type { StatementBook } from './statementBook.ts';
import { roundingTolerance } from './tolerance.ts';
import { restatedAlone } from './versionMix.ts';

/**
 * Whether a blank may mean that there is none. Of an optional line, one that many borrowers do not have, there is
 * none in a statement that leaves it out as long as the borrower never carried it; once it was carried a blank is
 * missing, as it always is for a required line. Desk practice, no source.
 */
export type Presence = 'required' | 'optional';

/** Names of routes under which a book keeps what was read; made once, since they are looked up for every figure. */
const TWELVE_MONTHS: Readonly<Record<Presence, string>> = {
  required: 'twelve months, required',
  optional: 'twelve months, optional',
};
const FLOW_ROUTES: Readonly<Record<Presence, string[]>> = { required: [], optional: [] };
const flowRoute = (months: number, presence: Presence): string =>
  (FLOW_ROUTES[presence][months] ??= `${months} months, ${presence}`);

const NONE: Reading = { kind: 'value', value: ZERO, inputs: [] };

/**
 * The amount of a balance line on a day, of the version in force.
 *
 * Whole currency units. Missing names the statement or the line that is not there.
 *
 * @example balanceAt(book, 'cash', '2026-09-30').value // => 6000000
 */
export const balanceAt = (
  book: StatementBook,
  line: LineItemCode,
  date: PlainDate,
  presence: Presence = 'required',
): Reading => flowOver(book, line, date, 0, presence);

/**
 * The amount of a line in the statement of exactly that period end and length; 0 months is a balance.
 *
 * @example flowOver(book, 'revenue', '2026-09-30', 9).value // => 66000000
 */
export function flowOver(
  book: StatementBook,
  line: LineItemCode,
  periodEnd: PlainDate,
  months: number,
  presence: Presence = 'required',
): Reading {
  const statement = book.statementOf(periodEnd, months);
  if (!statement) return { kind: 'missing', missing: [{ line: 'statement', periodEnd, months }] };
  const inputs = lineInputs(book, statement, line);
  if (!inputs && presence === 'optional' && !book.isCarriedBy(line, periodEnd)) return NONE;
  if (!inputs) return { kind: 'missing', missing: [{ line, periodEnd: statement.periodEnd, months }] };
  return { kind: 'value', value: sumOfInputs(inputs), inputs };
}

/**
 * The flow of the months up to a period end: the statement of that length, else the year to date less the year to
 * date before those months, within one financial year only.
 *
 * Whole currency units. Source: methods.md A3. Not meaningful where the two would mix versions of the accounts.
 *
 * @example flowOfMonths(book, 'revenue', '2026-09-30', 6).value // => 44000000
 */
export const flowOfMonths = (
  book: StatementBook,
  line: LineItemCode,
  periodEnd: PlainDate,
  months: number,
  presence: Presence = 'required',
): Reading =>
  book.kept(flowRoute(months, presence), line, periodEnd, () => {
    const direct = flowOver(book, line, periodEnd, months, presence);
    const intoYear = fiscalPosition(periodEnd, book.fiscalYearEndMonth).monthsIntoYear;
    if (direct.kind === 'value' || intoYear <= months) return direct;
    const longer = flowOver(book, line, periodEnd, intoYear, presence);
    if (longer.kind === 'missing') return nothingButStatement(direct) ? gapOf(direct, longer) : direct;
    const before = monthsBefore(periodEnd, months);
    return difference(book, line, presence, [periodEnd, intoYear], [before, intoYear - months]);
  });

/**
 * The flow of one quarter.
 *
 * @example quarterFlow(book, 'revenue', '2026-06-30').value // => 23000000
 */
export const quarterFlow = (
  book: StatementBook,
  line: LineItemCode,
  quarterEnd: PlainDate,
  presence: Presence = 'required',
): Reading => flowOfMonths(book, line, quarterEnd, 3, presence);

/**
 * The flow of the twelve months up to a period end.
 *
 * Routes, in this order: the twelve-month statement; year to date + last full year - the same year to date a year
 * earlier, all from one version of the accounts; four quarters. Where two routes exist on the same basis and lie
 * further apart than rounding explains, there is no figure and the reason shows both. A route that rests on
 * audited figures supersedes one that rests on management figures only.
 *
 * Whole currency units. Source: methods.md A3 and A2. Any part missing: missing, with the gap named.
 *
 * @example lastTwelveMonths(book, 'revenue', '2026-09-30').value // => 90000000
 */
export const lastTwelveMonths = (
  book: StatementBook,
  line: LineItemCode,
  periodEnd: PlainDate,
  presence: Presence = 'required',
): Reading =>
  book.kept(TWELVE_MONTHS[presence], line, periodEnd, () => {
    const yearToDate = byYearToDate(book, line, periodEnd, presence);
    const quarters = byQuarters(book, line, periodEnd, presence);
    const routes = [
      { name: 'twelve-month statement', reading: flowOver(book, line, periodEnd, 12, presence) },
      { name: 'year to date', reading: yearToDate },
      { name: 'four quarters', reading: quarters },
    ];
    const [first, ...others] = bestFounded(book, routes);
    if (!first) {
      const refused = routes.find(({ reading }) => reading.kind === 'not-meaningful');
      return refused?.reading ?? shorterGap(yearToDate, quarters, periodEnd);
    }
    const other = others.find(({ reading }) => contradicts(book, first.reading, reading));
    if (!other) return first.reading;
    return {
      kind: 'not-meaningful',
      reason: `${line} over twelve months to ${periodEnd} is ${first.reading.value.toFixed()} by ${first.name} and ${other.reading.value.toFixed()} by ${other.name}`,
      inputs: [...first.reading.inputs, ...other.reading.inputs],
    };
  });

type Value = Extract<Reading, { kind: 'value' }>;

interface Route<R extends Reading> {
  readonly name: string;
  readonly reading: R;
}

/** The routes that lead to a value on the best basis there is, in their order; the others are superseded. */
function bestFounded(book: StatementBook, routes: readonly Route<Reading>[]): readonly Route<Value>[] {
  const given = routes.flatMap(({ name, reading }) =>
    reading.kind === 'value' ? [{ name, reading, basis: bestBasis(book, reading.inputs) }] : [],
  );
  const best = Math.max(...given.map(({ basis }) => basis));
  return given.filter(({ basis }) => basis === best);
}

function byYearToDate(
  book: StatementBook,
  line: LineItemCode,
  periodEnd: PlainDate,
  presence: Presence,
): Reading {
  const months = fiscalPosition(periodEnd, book.fiscalYearEndMonth).monthsIntoYear;
  const yearToDate = flowOver(book, line, periodEnd, months, presence);
  if (months === 12) return yearToDate;
  const lastYearEnd = lastYearEndBefore(periodEnd, book.fiscalYearEndMonth);
  const yearBefore = monthsBefore(periodEnd, 12);
  const rest = difference(book, line, presence, [lastYearEnd, 12], [yearBefore, months]);
  return sumOfReadings([
    { sign: 1, reading: yearToDate },
    { sign: 1, reading: rest },
  ]);
}

const byQuarters = (
  book: StatementBook,
  line: LineItemCode,
  periodEnd: PlainDate,
  presence: Presence,
): Reading =>
  sumOfReadings(
    [9, 6, 3, 0].map((months) => ({
      sign: 1 as const,
      reading: quarterFlow(book, line, monthsBefore(periodEnd, months), presence),
    })),
  );

/** A longer period less a shorter one that begins on the same day, refused where only the longer was restated. */
function difference(
  book: StatementBook,
  line: LineItemCode,
  presence: Presence,
  longer: readonly [PlainDate, number],
  shorter: readonly [PlainDate, number],
): Reading {
  const sum = sumOfReadings([
    { sign: 1, reading: flowOver(book, line, ...longer, presence) },
    { sign: -1, reading: flowOver(book, line, ...shorter, presence) },
  ]);
  if (sum.kind !== 'value') return sum;
  const restated = restatedAlone(book, line, longer, shorter) ?? restatedAlone(book, line, shorter, longer);
  return restated ? { kind: 'not-meaningful', reason: restated, inputs: sum.inputs } : sum;
}

function contradicts(book: StatementBook, one: Value, other: Value): boolean {
  if (one.value.eq(other.value)) return false;
  const inputs = [...one.inputs, ...other.inputs];
  const units = statementsBehind(book, inputs).map(({ roundingUnit }) => roundingUnit);
  const tolerance = roundingTolerance({
    roundingUnit: Decimal.max(0, ...units),
    figures: inputs.length,
    reference: revenueBehind(book, one.inputs) ?? one.value,
  });
  return one.value.minus(other.value).abs().gt(tolerance);
}

/** Revenue over the same periods, added up as the inputs are. */
function revenueBehind(book: StatementBook, inputs: readonly InputUsed[]): Decimal | null {
  const seen = new Set<number>();
  let sum = ZERO;
  for (const { statementId, sign } of inputs) {
    if (seen.has(statementId)) continue;
    seen.add(statementId);
    const revenue = book.statementById(statementId)?.amounts.revenue;
    if (!revenue) return null;
    sum = sum.plus(revenue.times(sign));
  }
  return sum;
}

const statementsBehind = (book: StatementBook, inputs: readonly InputUsed[]): Statement[] =>
  inputs.flatMap(({ statementId }) => book.statementById(statementId) ?? []);

function bestBasis(book: StatementBook, inputs: readonly InputUsed[]): number {
  let best = 0;
  for (const { statementId } of inputs) {
    const statement = book.statementById(statementId);
    if (statement) best = Math.max(best, basisRank(statement.basis));
  }
  return best;
}

/** What is missing from twelve months, by the route that the borrower's latest statement belongs to. */
function shorterGap(yearToDate: Reading, quarters: Reading, periodEnd: PlainDate): Reading {
  const lacksLatest = (reading: Reading): boolean =>
    reading.kind === 'missing' &&
    reading.missing.some((gap) => gap.line === 'statement' && isSamePeriodEnd(gap.periodEnd, periodEnd));
  return lacksLatest(yearToDate) && !lacksLatest(quarters) ? quarters : yearToDate;
}

const nothingButStatement = (reading: Reading): boolean =>
  reading.kind === 'missing' && reading.missing.every(({ line }) => line === 'statement');

/** Of two ways that both lack something, the one whose statement is there says more exactly what is missing. */
const gapOf = (direct: Reading, longer: Reading): Reading => (nothingButStatement(longer) ? direct : longer);
