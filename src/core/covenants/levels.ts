/** Which level is in force on a day, and which come later. */
import { addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { Covenant, CovenantLevel } from './covenant.ts';

export type LevelInForce =
  | { readonly kind: 'level'; readonly level: Decimal }
  | { readonly kind: 'holiday' }
  | { readonly kind: 'none' };

/**
 * The level in force on a day. `until` is inclusive; where rows overlap the one that begins later wins, which is
 * how an amendment replaces what was agreed from its day on. A row without a level is a holiday.
 *
 * Source: methods.md A6.
 *
 * @example levelInForce(covenant.levels, '2025-12-31') // => { kind: 'level', level: 3.5 }
 */
export function levelInForce(levels: readonly CovenantLevel[], date: PlainDate): LevelInForce {
  const row = levels
    .filter(({ from, until }) => from <= date && (until === null || date <= until))
    .reduce<CovenantLevel | null>((latest, one) => (latest && latest.from > one.from ? latest : one), null);
  if (!row) return { kind: 'none' };
  return row.level === null ? { kind: 'holiday' } : { kind: 'level', level: row.level };
}

/**
 * The rows that begin after a day, in order.
 *
 * @example laterLevels(covenant.levels, '2025-12-31').map(({ from }) => from) // => ['2027-01-01']
 */
export const laterLevels = (levels: readonly CovenantLevel[], date: PlainDate): readonly CovenantLevel[] =>
  levels.filter(({ from }) => from > date).sort((a, b) => (a.from < b.from ? -1 : a.from > b.from ? 1 : 0));

/**
 * Every test date from the first one up to and including a day. Dates are month ends. Throws RangeError for a
 * rhythm of less than a month.
 *
 * @example testDates({ firstTestOn: '2026-03-31', everyMonths: 3 }, '2026-09-30') // => ['2026-03-31', '2026-06-30', '2026-09-30']
 */
export function testDates(
  { firstTestOn, everyMonths }: Pick<Covenant, 'firstTestOn' | 'everyMonths'>,
  until: PlainDate,
): readonly PlainDate[] {
  if (everyMonths < 1) throw new RangeError(`not a rhythm of tests: every ${everyMonths} months`);
  const dates: PlainDate[] = [];
  for (let date = firstTestOn; date <= until; date = addMonthsToMonthEnd(date, everyMonths)) dates.push(date);
  return dates;
}

/**
 * The first test date of every level that was agreed after signing.
 *
 * @example resetDates({ ...covenant, levels: [{ ...covenant.levels[0], from: '2025-08-01', isReset: true }] }).has('2025-09-30') // => true
 */
export const resetDates = (
  covenant: Pick<Covenant, 'firstTestOn' | 'everyMonths' | 'levels'>,
): ReadonlySet<PlainDate> => {
  const resets = covenant.levels.filter(({ isReset }) => isReset).map(({ from }) => from);
  const last = resets.reduce<PlainDate | null>(
    (latest, from) => (latest && latest > from ? latest : from),
    null,
  );
  if (last === null) return new Set();
  const dates = testDates(covenant, addMonthsToMonthEnd(last, covenant.everyMonths));
  return new Set(resets.flatMap((from) => dates.find((date) => date >= from) ?? []));
};
