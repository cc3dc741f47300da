/** Whether money put in cures a test, held against the agreement's right of cure: methods.md A6. */
import { isSamePeriodEnd, monthsBefore } from '../calendar/fiscalYear.ts';
import { addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import { daysOn } from '../calendar/deadline.ts';
import { formatDay } from '../calendar/printDay.ts';
import { MEASURES } from '../measures/index.ts';
import { Decimal, ZERO } from '../money/decimal.ts';
import { formatMoney } from '../money/print.ts';
import { certificateDue, type DeliveryTerms } from './certificateDue.ts';
import type { Covenant, CureRights, EquityCure } from './covenant.ts';
import { isMet, isNotMet, type CovenantTest, type CureStanding } from './covenantTest.ts';
import { countsOn, cureNeeded, curesUsed, sidesWithCure, withEarnings } from './equityCure.ts';
import type { Sides } from './headroom.ts';
import { verdictOn, type Shaped, type Terms } from './holdAgainstLevel.ts';

export interface CureContext {
  readonly undertakings: readonly DeliveryTerms[];
  /** Money that came in later is not there yet. */
  readonly asOf: PlainDate;
}

/** A cure that was let count, by the agreement's limits. */
interface CountedCure {
  readonly quarterEnd: PlainDate;
  readonly method: EquityCure['method'];
  readonly counted: Decimal;
}

/** A test with its cure, and why money that came in does not cure. */
export interface TestWithCure {
  readonly test: CovenantTest;
  readonly cure: CureStanding | null;
  readonly remark: string | null;
}

/** A quotient carries more digits than money has; what is printed of it stops well before that. */
const PLACES_OF_RATIO = 20;

/**
 * The cures of one covenant's tests, oldest first: money let in by one test counts as EBITDA on the next three and is
 * among those used. The tests themselves are left as the borrower's own figures made them.
 *
 * @example curesOf(covenant, [test], { undertakings: [], asOf: '2026-11-30' })[0].cure // => null
 */
export function curesOf(
  covenant: Covenant,
  tests: readonly CovenantTest[],
  context: CureContext,
): readonly TestWithCure[] {
  const counted: CountedCure[] = [];
  return tests.map((test) => {
    const found = cureOf(covenant, test, counted, context);
    if (found.cure?.curedBy === 'money' && found.cure.counted && found.money)
      counted.push({
        quarterEnd: test.testDate,
        method: found.money.method,
        counted: found.cure.counted,
      });
    return { test, cure: found.cure, remark: found.remark };
  });
}

interface Found {
  readonly cure: CureStanding | null;
  readonly money: EquityCure | null;
  readonly remark: string | null;
}

const NOTHING: Found = { cure: null, money: null, remark: null };

function cureOf(
  covenant: Covenant,
  test: CovenantTest,
  before: readonly CountedCure[],
  context: CureContext,
): Found {
  const { numerator, denominator, level } = test;
  if (!numerator || !level || !(isMet(test.underlyingOutcome) || isNotMet(test.underlyingOutcome)))
    return NOTHING;
  const measure = MEASURES[covenant.measure];
  const terms: Terms = { operator: covenant.operator, level, roundingPlaces: covenant.roundingPlaces };
  const carried = carriedOn(before, test.testDate);
  const sides = withEarnings(measure, { numerator, denominator }, carried);
  const standing = blankStanding(covenant.cureRights, test, before, context);
  const { money, leftOut } = moneyFor(covenant, standing, test.testDate, context.asOf);
  const isCarried = carried.gt(0);
  if (isMet(test.underlyingOutcome) && !isCarried) return NOTHING;
  if (!covenant.cureRights && !money && !isCarried) return NOTHING;
  const base: CureStanding = {
    ...standing,
    carried,
    needed: cureNeeded(measure, sides, level),
    received: money?.amount ?? null,
    receivedOn: money?.receivedOn ?? null,
    ratioWith: isCarried ? ratioOf(measure, sides, terms) : null,
    countsUntil: isCarried ? lastDateOf(before, test.testDate) : null,
  };
  if (isMet(test.underlyingOutcome)) return { cure: base, money: null, remark: null };
  if (isCarried && isMet(verdictOn(measure, sides, terms).outcome))
    return { cure: { ...base, curedBy: 'money of an earlier quarter' }, money: null, remark: null };
  if (!money) return { ...NOTHING, cure: base };
  const found = withMoney(covenant, base, { measure, sides, terms, money });
  const said = [found.remark, leftOutInWords(leftOut)].filter((one) => one !== null);
  return { ...found, remark: said.length > 0 ? said.join('; ') : null };
}

function blankStanding(
  rights: CureRights | null,
  { testDate }: CovenantTest,
  before: readonly CountedCure[],
  { undertakings }: CureContext,
): CureStanding {
  const due = certificateDue(undertakings, testDate);
  const used = curesUsed({
    curedQuarters: before.map(({ quarterEnd }) => quarterEnd),
    testDate,
    mostInFour: rights?.mostInFour ?? 0,
    mostInLife: rights?.mostInLife ?? 0,
  });
  return {
    curedBy: null,
    method: rights?.method ?? null,
    periodEnds: rights && due ? daysOn(due, rights.withinBusinessDays, 'business') : null,
    needed: { ebitda: null, debt: null, both: null },
    received: null,
    receivedOn: null,
    counted: null,
    carried: ZERO,
    countsUntil: null,
    ratioWith: null,
    usedInFour: used.usedInFour,
    mostInFour: rights?.mostInFour ?? null,
    usedInLife: used.usedInLife,
    mostInLife: rights?.mostInLife ?? null,
  };
}

/**
 * What came in for one quarter in time and the way the agreement counts it, as one; a payment later than another moves
 * the day. Where nothing did, what came in first says why.
 */
function moneyFor(
  { cures, cureRights }: Covenant,
  { periodEnds }: CureStanding,
  testDate: PlainDate,
  asOf: PlainDate,
): { readonly money: EquityCure | null; readonly leftOut: readonly EquityCure[] } {
  const own = cures.filter(
    ({ quarterEnd, receivedOn }) => receivedOn <= asOf && isSamePeriodEnd(quarterEnd, testDate),
  );
  const counting = own.filter(
    ({ method, receivedOn }) =>
      method === cureRights?.method && (periodEnds === null || receivedOn <= periodEnds),
  );
  const taken = counting.length > 0 ? counting : own.filter(({ method }) => method === own[0]?.method);
  const [first] = taken;
  if (!first) return { money: null, leftOut: [] };
  const amount = sumOfMoney(taken);
  const receivedOn = taken.reduce(
    (last, one) => (one.receivedOn > last ? one.receivedOn : last),
    first.receivedOn,
  );
  return { money: { ...first, amount, receivedOn }, leftOut: own.filter((one) => !taken.includes(one)) };
}

const sumOfMoney = (cures: readonly EquityCure[]): Decimal =>
  Decimal.sum(0, ...cures.map(({ amount }) => amount));

const leftOutInWords = (leftOut: readonly EquityCure[]): string | null =>
  leftOut.length === 0
    ? null
    : `${formatMoney(sumOfMoney(leftOut))} more put in is not counted: it came late or counts another way`;

const carriedOn = (before: readonly CountedCure[], testDate: PlainDate): Decimal =>
  Decimal.sum(0, ...stillCounting(before, testDate).map(({ counted }) => counted));

const stillCounting = (before: readonly CountedCure[], testDate: PlainDate): readonly CountedCure[] =>
  before.filter(({ quarterEnd, method }) => method !== 'debt' && countsOn(quarterEnd, testDate));

/** The day on which the latest of the carried cures counts for the last time. */
const lastDateOf = (before: readonly CountedCure[], testDate: PlainDate): PlainDate | null => {
  const latest = stillCounting(before, testDate).at(-1);
  return latest ? addMonthsToMonthEnd(monthsBefore(latest.quarterEnd, 0), 9) : null;
};

function withMoney(
  { cureRights, operator }: Covenant,
  base: CureStanding,
  {
    measure,
    sides,
    terms,
    money,
  }: {
    readonly measure: Shaped;
    readonly sides: Sides;
    readonly terms: Terms;
    readonly money: EquityCure;
  },
): Found {
  const needed = base.needed[money.method];
  const isStrict = operator === '<' || operator === '>';
  // Where the level itself is not enough there is no least amount that is, so nothing is cut off.
  const counted = needed && !isStrict ? Decimal.min(money.amount, needed) : money.amount;
  const withIt = sidesWithCure(measure, sides, counted, money.method);
  const reaches =
    (!isStrict && needed !== null && money.amount.gte(needed)) ||
    isMet(verdictOn(measure, withIt, terms).outcome);
  const ratioWith = ratioOf(measure, withIt, terms);
  const refused = refusal(cureRights, base, money, reaches);
  if (refused !== null) return { cure: { ...base, ratioWith }, money, remark: refused };
  return {
    cure: {
      ...base,
      curedBy: 'money',
      counted,
      ratioWith,
      countsUntil: money.method === 'debt' ? null : addMonthsToMonthEnd(money.quarterEnd, 9),
      usedInFour: base.usedInFour + 1,
      usedInLife: base.usedInLife + 1,
    },
    money,
    remark:
      base.periodEnds === null
        ? 'no day is recorded on which the certificate is due, so the time is not checked'
        : null,
  };
}

/** Why money that came in does not cure; null where it does. */
function refusal(
  rights: CureRights | null,
  { usedInFour, usedInLife, periodEnds, needed }: CureStanding,
  money: EquityCure,
  reaches: boolean,
): string | null {
  const came = `${formatMoney(money.amount)} put in on ${formatDay(money.receivedOn)} does not cure`;
  if (!rights) return `${came}: the agreement gives no right of cure`;
  if (money.method !== rights.method)
    return `${came}: recorded as ${METHOD_WORDS[money.method]}, the agreement counts it as ${METHOD_WORDS[rights.method]}`;
  if (usedInFour >= rights.mostInFour)
    return `${came}: ${usedInFour} of ${rights.mostInFour} cures in four quarters are used`;
  if (usedInLife >= rights.mostInLife)
    return `${came}: ${usedInLife} of ${rights.mostInLife} cures over the life are used`;
  if (periodEnds !== null && money.receivedOn > periodEnds)
    return `${came}: the cure period ended on ${formatDay(periodEnds)}`;
  if (reaches) return null;
  const least = needed[money.method];
  return `${came}: ${least ? `${formatMoney(least, { beside: money.amount })} is needed` : 'money counted this way cannot reach the level'}`;
}

/** How money counts, in words. */
export const METHOD_WORDS: Readonly<Record<EquityCure['method'], string>> = {
  ebitda: 'EBITDA',
  debt: 'debt repaid',
  both: 'EBITDA and debt repaid',
};

const ratioOf = (measure: Shaped, sides: Sides, terms: Terms): Decimal | null =>
  verdictOn(measure, sides, terms).tested?.toDecimalPlaces(PLACES_OF_RATIO) ?? null;
