/** Lines of the statements as a covenant takes them: over its months, in its currency. Source: methods.md A3. */
import { monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { Decimal } from '../money/decimal.ts';
import {
  balanceAt,
  flowOfMonths,
  lastTwelveMonths,
  quarterFlow,
  type Presence,
} from '../statements/flows.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { sumOfInputs, sumOfReadings, type InputUsed, type Reading } from '../statements/reading.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import type { CurrencyRate, MeasureRequest } from './definition.ts';
import { rateInWords } from './translation.ts';

const MONTHS_OF_QUARTER = 3;

type Value = Extract<Reading, { kind: 'value' }>;

/**
 * A flow over the months of the request, in the covenant's currency: quarter by quarter at the average rate of each
 * where the quarters are there and add up to the flow, else every period that it is made of at its own average.
 *
 * Missing as the statements lack it; not meaningful, naming the rate, where one is not recorded.
 *
 * @example flowIn(request, 'revenue').value // => 90000000
 */
export function flowIn(
  request: MeasureRequest,
  line: LineItemCode,
  presence: Presence = 'required',
): Reading {
  const { book, date, months } = request;
  const flow =
    months === 12
      ? lastTwelveMonths(book, line, date, presence)
      : flowOfSomeMonths(book, line, date, months, presence);
  if (flow.kind !== 'value' || !isForeign(request, flow.inputs)) return flow;
  const quarters = quartersOf(request, line, presence);
  const isByQuarters = quarters !== null && Decimal.sum(...quarters.map(({ value }) => value)).eq(flow.value);
  return translated(request, isByQuarters ? quarters.flatMap(byQuarter(request)) : flow.inputs.map(byPeriod));
}

/** The statement of just these months, else the quarters that they are made of. */
function flowOfSomeMonths(
  book: StatementBook,
  line: LineItemCode,
  date: PlainDate,
  months: number,
  presence: Presence,
): Reading {
  const flow = flowOfMonths(book, line, date, months, presence);
  if (flow.kind !== 'missing' || months % MONTHS_OF_QUARTER !== 0) return flow;
  const quarters = sumOfReadings(
    quarterEnds(date, months).map((end) => ({
      sign: 1 as const,
      reading: quarterFlow(book, line, end, presence),
    })),
  );
  return quarters.kind === 'value' ? quarters : flow;
}

/**
 * A balance on a day in the covenant's currency: at the closing rate, or at the average rate of the request's months
 * where the agreement says so.
 *
 * @example balanceIn(request, 'cash', '2026-09-30').value // => 6000000
 */
export function balanceIn(
  request: MeasureRequest,
  line: LineItemCode,
  date: PlainDate,
  presence: Presence = 'required',
  kind: CurrencyRate['kind'] = 'closing',
): Reading {
  const balance = balanceAt(request.book, line, date, presence);
  if (balance.kind !== 'value' || !isForeign(request, balance.inputs)) return balance;
  return kind === 'closing'
    ? translated(
        request,
        balance.inputs.map((input) => ({ input, kind, periodEnd: date, months: 0 })),
      )
    : atAverageOfMonths(request, balance);
}

/**
 * An amount of the statements' currency at the average rate of the request's months: the mean of its quarters', else
 * that of the whole period.
 *
 * @example atAverageOfMonths(request, { kind: 'value', value: decimal(5), inputs: [] }).value // => 5
 */
export function atAverageOfMonths(request: MeasureRequest, amount: Value): Reading {
  const { date, months, translation } = request;
  const from = amount.inputs.map((input) => currencyOf(request, input))[0];
  if (from === undefined || from === translation.currency) return amount;
  const rates = quarterEnds(date, months).map((end) =>
    translation.rateOf('average', from, end, MONTHS_OF_QUARTER),
  );
  const known = rates.filter((rate) => rate !== null);
  const rate =
    known.length === rates.length && known.length > 0
      ? Decimal.sum(...known).div(known.length)
      : translation.rateOf('average', from, date, months);
  if (!rate) return withoutRate(request, { from, kind: 'average', periodEnd: date, months }, amount.inputs);
  const inputs = amount.inputs.map((input) => ({ ...input, rate }));
  return { kind: 'value', value: amount.value.times(rate), inputs };
}

/**
 * Whether a figure is in another currency than the covenant.
 *
 * @example isForeign(request, []) // => false
 */
const isForeign = (request: MeasureRequest, inputs: readonly InputUsed[]): boolean =>
  request.book.currency !== request.translation.currency &&
  inputs.some((input) => currencyOf(request, input) !== request.translation.currency);

const currencyOf = ({ book, translation }: MeasureRequest, { statementId }: InputUsed): string =>
  book.statementById(statementId)?.currency ?? translation.currency;

const quarterEnds = (date: PlainDate, months: number): readonly PlainDate[] =>
  Array.from({ length: Math.floor(months / MONTHS_OF_QUARTER) }, (_, quarter) =>
    monthsBefore(date, quarter * MONTHS_OF_QUARTER),
  );

interface Part extends Pick<CurrencyRate, 'kind' | 'periodEnd'> {
  readonly input: InputUsed;
  readonly months: number;
}

/** The quarters of the request's months; null where one is not there. */
function quartersOf(
  { book, date, months }: MeasureRequest,
  line: LineItemCode,
  presence: Presence,
): readonly Value[] | null {
  if (months % MONTHS_OF_QUARTER !== 0) return null;
  const readings = quarterEnds(date, months).map((end) => quarterFlow(book, line, end, presence));
  const values = readings.filter((reading) => reading.kind === 'value');
  return values.length === readings.length ? values : null;
}

const byQuarter =
  ({ date }: MeasureRequest) =>
  ({ inputs }: Value, quarter: number): readonly Part[] =>
    inputs.map((input) => ({
      input,
      kind: 'average',
      periodEnd: monthsBefore(date, quarter * MONTHS_OF_QUARTER),
      months: MONTHS_OF_QUARTER,
    }));

const byPeriod = (input: InputUsed): Part => ({
  input,
  kind: 'average',
  periodEnd: input.periodEnd,
  months: input.months,
});

/** Every part at its rate; the first rate that is not recorded is named. */
function translated(request: MeasureRequest, parts: readonly Part[]): Reading {
  const inputs: InputUsed[] = [];
  for (const { input, kind, periodEnd, months } of parts) {
    const from = currencyOf(request, input);
    if (from === request.translation.currency) {
      inputs.push(input);
      continue;
    }
    const rate = request.translation.rateOf(kind, from, periodEnd, months);
    if (!rate)
      return withoutRate(
        request,
        { from, kind, periodEnd, months },
        parts.map((part) => part.input),
      );
    inputs.push({ ...input, rate });
  }
  return { kind: 'value', value: sumOfInputs(inputs), inputs };
}

const withoutRate = (
  { translation }: MeasureRequest,
  rate: Pick<CurrencyRate, 'from' | 'kind' | 'periodEnd'> & { readonly months: number },
  inputs: readonly InputUsed[],
): Reading => ({
  kind: 'not-meaningful',
  reason: `figures in ${rate.from}, covenant in ${translation.currency}: no ${rateInWords({ ...rate, to: translation.currency })} is recorded`,
  inputs,
});
