import { monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { ebitdaOfTwelveMonths } from '../measures/ebitda.ts';
import { MEASURES } from '../measures/index.ts';
import { Decimal } from '../money/decimal.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { hasResult, latestLiveTest } from './latestLiveTest.ts';
import type { CovenantTest } from './covenantTest.ts';

/** Two years of quarters. */
const CHANGES = 8;

/**
 * The standard deviation (n - 1) of the last eight quarterly changes in EBITDA of twelve months up to a day, in whole
 * currency units. Null where one of the nine figures is missing. Source: methods.md A5.
 *
 * @example earningsDeviation(book, '2026-09-30') // => null
 */
function earningsDeviation(book: StatementBook, date: PlainDate): Decimal | null {
  const earnings = Array.from(
    { length: CHANGES + 1 },
    (_, quarters) => ebitdaOfTwelveMonths(book, monthsBefore(date, 3 * quarters)).ebitda,
  );
  const values = earnings.flatMap((reading) => (reading.kind === 'value' ? [reading.value] : []));
  return values.length > CHANGES ? deviationOfChanges(values) : null;
}

/**
 * The standard deviation (n - 1) of the differences between neighbours.
 *
 * @example deviationOfChanges([decimal(6), decimal(4), decimal(4)]).toFixed(4) // => '1.4142'
 */
export function deviationOfChanges(values: readonly Decimal[]): Decimal {
  const changes = values.slice(1).map((value, place) => value.minus(values[place] ?? value));
  const mean = Decimal.sum(0, ...changes).div(changes.length);
  const squares = changes.map((change) => change.minus(mean).pow(2));
  return Decimal.sum(0, ...squares)
    .div(changes.length - 1)
    .sqrt();
}

/**
 * The tests of one covenant with the latest live one's room in deviations: the money that earnings may fall over the
 * deviation of what they did fall and rise. The others say nothing of today; a test without earnings, or without
 * room, has none.
 * Accounts and covenant must be in one currency. Source: methods.md A5, after Demerjian and Owens.
 *
 * @example withRoomInDeviations([test], book)[0].roomInDeviations // => null
 */
export function withRoomInDeviations(
  tests: readonly CovenantTest[],
  book: StatementBook,
): readonly CovenantTest[] {
  const [first] = tests;
  const live = first ? latestLiveTest(tests, first.covenantId) : null;
  const money = live?.headroom.moneyLeft;
  if (!live || !money?.gt(0) || !hasResult(live) || MEASURES[live.measure].earningsSide === null)
    return tests;
  const deviation = earningsDeviation(book, live.testDate);
  if (!deviation || deviation.isZero()) return tests;
  return tests.map((test) => (test === live ? { ...test, roomInDeviations: money.div(deviation) } : test));
}
