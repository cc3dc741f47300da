/** Why a test date has no result: nothing to be tested, no figures, no rate, no valuation that may be used. */
import { isSamePeriodEnd } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import type { MissingLine } from '../measures/measure.ts';
import { lineItem } from '../statements/lineItems.ts';
import type { Covenant } from './covenant.ts';
import type { Outcome } from './covenantTest.ts';
import type { Figures } from './figures.ts';
import { NO_HEADROOM, type Sides } from './headroom.ts';
import type { Held } from './holdAgainstLevel.ts';
import type { LevelInForce } from './levels.ts';

/**
 * What stands in place of a result, with its reason; null where the figures and the level are there. Each of these
 * is its own outcome and none is met. Source: methods.md A4.
 *
 * @example withoutResult(covenant, '2026-09-30', { kind: 'holiday' }, figures)?.reason // => 'covenant holiday on 30 Sep 2026'
 */
export const withoutResult = (
  covenant: Covenant,
  testDate: PlainDate,
  inForce: LevelInForce,
  figures: Figures,
): Held | null =>
  notTested(covenant, testDate, inForce.kind, figures.sides) ?? withoutFigures(covenant, figures, testDate);

/** A day on which the agreement tests nothing; the ratio is shown all the same. */
function notTested(
  { firstTestOn }: Covenant,
  testDate: PlainDate,
  level: 'level' | 'holiday' | 'none',
  sides: Sides | null,
): Held | null {
  const reason =
    testDate < firstTestOn
      ? `before the first test on ${formatDay(firstTestOn)}`
      : level === 'holiday'
        ? `covenant holiday on ${formatDay(testDate)}`
        : level === 'none'
          ? `no level in force on ${formatDay(testDate)}`
          : null;
  return reason === null ? null : { ...nothingHeld('not tested', reason), tested: ratioOf(sides) };
}

function ratioOf(sides: Sides | null): Held['tested'] {
  if (!sides) return null;
  if (!sides.denominator) return sides.numerator;
  return sides.denominator.gt(0) ? sides.numerator.div(sides.denominator) : null;
}

/** Figures of the test date that have not come are awaited; any other gap is for a person to look at. */
function withoutFigures(
  { basis }: Covenant,
  { missing, readings }: Figures,
  testDate: PlainDate,
): Held | null {
  const kind = basis === null || basis === 'management' ? '' : `${basis} `;
  if (missing.some(({ line, periodEnd }) => line === 'statement' && isSamePeriodEnd(periodEnd, testDate)))
    return nothingHeld('awaiting figures', `${kind}figures to ${formatDay(testDate)} are not there`);
  if (missing.length > 0)
    return nothingHeld('cannot be tested', `missing: ${missing.map(gapInWords).join(', ')}`);
  const refused = readings.find((reading) => reading.kind === 'not-meaningful');
  return refused?.kind === 'not-meaningful' ? nothingHeld('cannot be tested', refused.reason) : null;
}

function gapInWords({ line, periodEnd, months }: MissingLine): string {
  const what = line === 'statement' ? 'figures' : lineItem(line).label;
  return months === 0
    ? `${what} on ${formatDay(periodEnd)}`
    : `${what} of ${months} months to ${formatDay(periodEnd)}`;
}

const nothingHeld = (outcome: Outcome, reason: string): Held => ({
  tested: null,
  outcome,
  reason,
  roundingDecides: false,
  headroom: { ...NO_HEADROOM, fallOf: 'earnings' },
});
