/** What stands over the borrower's own figures: money put in, the next test, the desk's own trigger. */
import { formatDay } from '../calendar/printDay.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { isMaximum, type Covenant } from './covenant.ts';
import { isMet, isNotMet, type CovenantTest, type CureStanding, type Outcome } from './covenantTest.ts';
import { curesOf, METHOD_WORDS, type CureContext, type TestWithCure } from './cures.ts';
import { resetDates } from './levels.ts';
import { formatMoney } from '../money/print.ts';

/**
 * The tests of one covenant, oldest first, with the rights of its agreement: cured by money, by money of an earlier
 * quarter or by meeting the next test; in its cure period; or, for the desk's own trigger, in words of our own. The
 * failure stays underneath: `underlyingOutcome`, ratio and headroom are those of the borrower's own figures.
 *
 * Money that cures comes before a waiver; a waiver before the next test and the cure period. Source: methods.md A6.
 *
 * @example withRights(covenant, [test], { undertakings: [], asOf: '2026-11-30' })[0].outcome // => 'met'
 */
export function withRights(
  covenant: Covenant,
  tests: readonly CovenantTest[],
  context: CureContext,
): readonly CovenantTest[] {
  const resets = resetDates(covenant);
  const marked = tests.map((test) => ({ ...test, isFirstUnderReset: resets.has(test.testDate) }));
  if (covenant.isOurs) return marked.map((test) => againstOurTrigger(covenant, test));
  const byNext = covenant.cureRights?.curedByNextTest ?? false;
  return curesOf(covenant, marked, context).map((found, place) => {
    const next = byNext ? metNext(marked.slice(place + 1)) : null;
    return withCure(found, next, context.asOf);
  });
}

/** The next test, where it is met: one that awaits its figures, or cannot be tested, has cured nothing. */
function metNext(later: readonly CovenantTest[]): CovenantTest | null {
  const next = later.find(({ outcome }) => outcome !== 'not tested');
  return next && isMet(next.outcome) ? next : null;
}

function withCure(
  { test, cure, remark }: TestWithCure,
  next: CovenantTest | null,
  asOf: PlainDate,
): CovenantTest {
  const said = { ...test, cure, reason: joined(test.reason, remark) };
  if (!isNotMet(test.underlyingOutcome)) return said;
  if (cure && cure.curedBy !== null)
    return { ...said, outcome: 'cured', reason: joined(curedInWords(cure), said.reason) };
  if (test.outcome === 'not met, waived') return said;
  if (next)
    return {
      ...said,
      outcome: 'cured',
      reason: joined(`cured by meeting the next test on ${formatDay(next.testDate)}`, said.reason),
      cure: cure && { ...cure, curedBy: 'the next test' },
    };
  return cure && isInCurePeriod(cure, asOf)
    ? { ...said, outcome: 'not met, in cure period', reason: joined(periodInWords(cure), said.reason) }
    : said;
}

/** A right that can be used: money can reach the level, a cure is left, and its last day has not passed. */
const isInCurePeriod = (cure: CureStanding, asOf: PlainDate): boolean =>
  cure.method !== null &&
  cure.needed[cure.method] !== null &&
  cure.usedInFour < (cure.mostInFour ?? 0) &&
  cure.usedInLife < (cure.mostInLife ?? 0) &&
  cure.periodEnds !== null &&
  asOf <= cure.periodEnds;

const periodInWords = ({ periodEnds, method, needed }: CureStanding): string => {
  const amount = method && needed[method];
  const takes = method && amount ? `: ${formatMoney(amount)} as ${METHOD_WORDS[method]} would cure` : '';
  return `cure period until ${periodEnds ? formatDay(periodEnds) : 'a day not recorded'}${takes}`;
};

function curedInWords(cure: CureStanding): string {
  if (cure.curedBy === 'money of an earlier quarter')
    return `cured by ${formatMoney(cure.carried)} put in earlier, which counts until ${cure.countsUntil ? formatDay(cure.countsUntil) : 'its fourth quarter'}`;
  const amount = cure.counted ? formatMoney(cure.counted) : 'money';
  const way = cure.method ? `, counted as ${METHOD_WORDS[cure.method]}` : '';
  return `cured by ${amount} put in${cure.receivedOn ? ` on ${formatDay(cure.receivedOn)}` : ''}${way}`;
}

const againstOurTrigger = (covenant: Covenant, test: CovenantTest): CovenantTest => ({
  ...test,
  outcome: shownOutcome(covenant, test.outcome),
});

/**
 * The words for a result on the wrong side of the desk's own trigger, which is no covenant.
 *
 * @example triggerWords('<=') // => 'above our trigger'
 */
export const triggerWords = (operator: Covenant['operator']): Outcome =>
  isMaximum(operator) ? 'above our trigger' : 'below our trigger';

/**
 * How an outcome against another level or on other earnings reads: as it is, or in the words of the desk's own
 * trigger.
 *
 * @example shownOutcome({ isOurs: true, operator: '>=' }, 'not met') // => 'below our trigger'
 */
export const shownOutcome = (
  { isOurs, operator }: Pick<Covenant, 'isOurs' | 'operator'>,
  outcome: Outcome,
): Outcome => (isOurs && isNotMet(outcome) ? triggerWords(operator) : outcome);

const joined = (...said: readonly (string | null)[]): string | null => {
  const parts = said.filter((one) => one !== null && one !== '');
  return parts.length > 0 ? parts.join('; ') : null;
};
