/** One covenant tested on one day, as the agreement defines it, on the figures known by another day. */
import { lastYearEndBefore } from '../calendar/fiscalYear.ts';
import { addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import type { CurrencyRate } from '../measures/definition.ts';
import { MEASURES } from '../measures/index.ts';
import type { Measure } from '../measures/measured.ts';
import type { Decimal } from '../money/decimal.ts';
import type { Policy } from '../policy.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { withoutAddBacks } from './counterfactual.ts';
import type { Covenant, Waiver } from './covenant.ts';
import { isNotMet, type CovenantTest, type Outcome } from './covenantTest.ts';
import { figuresOf, type Figures } from './figures.ts';
import { fallOf, NO_HEADROOM, type Sides } from './headroom.ts';
import { holdAgainstLevel, verdictOn, type Held, type Terms } from './holdAgainstLevel.ts';
import { hasResult } from './latestLiveTest.ts';
import { laterLevels, levelInForce } from './levels.ts';
import { remarks } from './remarks.ts';
import { springingOn, type SpringingOn } from './springing.ts';
import { withoutResult } from './withoutResult.ts';

/**
 * Tests a covenant on a test date out of the book of its scope; `asOf` says which waivers stand, `rates` turn the
 * figures into the covenant's currency where it is another one.
 *
 * Only met is met: figures that have not come are awaited, a line or an older period that is not there means that
 * it cannot be tested, a holiday or a day without a level is not tested though the ratio is shown, and a waived
 * test stays not met underneath. Amounts in whole units of the covenant's currency. Source: methods.md A4 to A6.
 *
 * @example testCovenant(covenant, book, '2026-09-30', POLICY_VERSION_1, '2026-11-30').outcome // => 'met'
 */
export function testCovenant(
  covenant: Covenant,
  book: StatementBook,
  testDate: PlainDate,
  policy: Policy,
  asOf: PlainDate,
  rates: readonly CurrencyRate[] = [],
): CovenantTest {
  const { figures, sprung, nothing } = groundsOf(covenant, book, testDate, rates);
  const { measure, operator } = covenant;
  const said = nothing
    ? nothingSaid(nothing, covenant)
    : withResult(covenant, book, figures, { testDate, policy, asOf });
  return {
    covenantId: covenant.id,
    measure,
    testDate,
    operator,
    level: figures.level,
    nextLevel: nextLevelOf(covenant, testDate),
    numerator: figures.sides?.numerator ?? null,
    denominator: figures.sides?.denominator ?? null,
    bridge: figures.bridge,
    inputs: [...figures.inputs, ...figures.levelInputs],
    earnings: figures.sides?.earnings ?? null,
    missing: figures.missing,
    springing: sprung?.standing ?? null,
    // Only the tests beside it, the undertakings and the other figures of the borrower can tell: withRights, assess.
    roomInDeviations: null,
    cure: null,
    isFirstUnderReset: false,
    tested: said.tested,
    outcome: said.outcome,
    underlyingOutcome: said.underlyingOutcome,
    reason: said.reason,
    headroom: said.headroom,
    againstLaterLevels: said.againstLaterLevels,
    justPassing: said.justPassing,
    counterfactuals: said.counterfactuals,
    otherAccounting: said.otherAccounting,
    waiver: said.waiver,
  };
}

function withResult(
  covenant: Covenant,
  book: StatementBook,
  figures: Figures,
  {
    testDate,
    policy,
    asOf,
  }: { readonly testDate: PlainDate; readonly policy: Policy; readonly asOf: PlainDate },
): Said {
  const { sides, level } = figures;
  if (!sides || !level) throw new Error(`covenant ${covenant.id} on ${testDate}: no sides or no level`);
  const { operator, roundingPlaces } = covenant;
  const lastDay = lastDayOfResult(covenant, book, testDate);
  return resultSaid(
    covenant,
    figures,
    sides,
    { operator, level, roundingPlaces },
    { testDate, policy, asOf, lastDay },
  );
}

/**
 * The outcome underneath of a test, whatever was waived, without all that is shown of it.
 *
 * @example underlyingOutcomeOf(covenant, book, '2026-09-30', POLICY_VERSION_1) // => 'met'
 */
export function underlyingOutcomeOf(
  covenant: Covenant,
  book: StatementBook,
  testDate: PlainDate,
  policy: Policy,
  rates: readonly CurrencyRate[] = [],
): Outcome {
  const { figures, nothing } = groundsOf(covenant, book, testDate, rates);
  if (nothing) return nothing.outcome;
  const { measure, operator, roundingPlaces } = covenant;
  const { sides, level } = figures;
  if (!sides || !level) throw new Error(`covenant ${covenant.id} on ${testDate}: no sides or no level`);
  return thinOrNot(holdAgainstLevel(MEASURES[measure], sides, { operator, level, roundingPlaces }), policy);
}

/** What a test rests on, and why there is no result where there is none. */
function groundsOf(
  covenant: Covenant,
  book: StatementBook,
  testDate: PlainDate,
  rates: readonly CurrencyRate[],
): { readonly figures: Figures; readonly sprung: SpringingOn | null; readonly nothing: Held | null } {
  const figures = figuresOf(covenant, book, testDate, rates);
  const inForce = levelInForce(covenant.levels, testDate);
  const sprung = covenant.springing && springingOn(covenant.springing, book, testDate);
  const nothing = notSprung(sprung, withoutResult(covenant, testDate, inForce, figures), figures);
  return { figures, sprung, nothing };
}

/**
 * Below its share of drawings a covenant is not tested, whatever its figures came to; where the drawings are not
 * known it cannot be tested. Figures that have not come, a holiday and a day without a level come first.
 */
function notSprung(sprung: SpringingOn | null, nothing: Held | null, { sides }: Figures): Held | null {
  if (!sprung || sprung.outcome === 'tested') return nothing;
  if (nothing && nothing.outcome !== 'cannot be tested') return nothing;
  return {
    tested: sides && ratioShown(sides),
    outcome: sprung.outcome,
    reason: sprung.reason,
    roundingDecides: false,
    headroom: { ...NO_HEADROOM, fallOf: 'earnings' },
  };
}

const ratioShown = ({ numerator, denominator }: Sides): Held['tested'] => {
  if (!denominator) return numerator;
  return denominator.gt(0) ? numerator.div(denominator) : null;
};

type Said = Pick<
  CovenantTest,
  | 'tested'
  | 'outcome'
  | 'underlyingOutcome'
  | 'reason'
  | 'headroom'
  | 'againstLaterLevels'
  | 'justPassing'
  | 'counterfactuals'
  | 'otherAccounting'
  | 'waiver'
>;

const nothingSaid = ({ tested, outcome, reason, headroom }: Held, { measure }: Covenant): Said => ({
  tested,
  outcome,
  underlyingOutcome: outcome,
  reason,
  headroom: { ...headroom, fallOf: fallOf(MEASURES[measure]) },
  againstLaterLevels: [],
  justPassing: false,
  counterfactuals: [],
  otherAccounting: null,
  waiver: null,
});

function resultSaid(
  covenant: Covenant,
  figures: Figures,
  sides: Sides,
  terms: Terms,
  on: {
    readonly testDate: PlainDate;
    readonly policy: Policy;
    readonly asOf: PlainDate;
    readonly lastDay: PlainDate | null;
  },
): Said {
  const measure = MEASURES[covenant.measure];
  const held = holdAgainstLevel(measure, sides, terms);
  const underlyingOutcome = thinOrNot(held, on.policy);
  const granted = isNotMet(underlyingOutcome)
    ? covenant.waivers.filter(({ testDate, grantedOn }) => testDate === on.testDate && grantedOn <= on.asOf)
    : [];
  const waiver = granted.find(({ until }) => until === null || on.asOf <= until) ?? null;
  return {
    tested: held.tested,
    outcome: waiver ? 'not met, waived' : underlyingOutcome,
    underlyingOutcome,
    waiver: waiver && { grantedOn: waiver.grantedOn, until: waiver.until, conditions: waiver.conditions },
    reason: remarks(covenant, held, figures, waiver ? null : ranOut(granted)),
    headroom: held.headroom,
    againstLaterLevels: hasResult(held) ? againstLater(covenant, on, sides, held.tested) : [],
    justPassing: isJustPassing(held, on.policy),
    otherAccounting: byTodaysRules(measure, figures, terms),
    counterfactuals: hasResult(held) ? withoutAddBacks(measure, sides, terms, figures.addBacksTaken) : [],
  };
}

/** The same test by the accounting rules of today, where the covenant goes by those at signing: both are shown. */
function byTodaysRules(
  measure: Measure,
  { otherSides }: Figures,
  terms: Terms,
): CovenantTest['otherAccounting'] {
  if (!otherSides) return null;
  const { tested, outcome } = verdictOn(measure, otherSides, terms);
  const { numerator, denominator } = otherSides;
  return { accounting: 'current', numerator, denominator, tested, outcome };
}

function nextLevelOf({ levels }: Covenant, testDate: PlainDate): CovenantTest['nextLevel'] {
  const next = laterLevels(levels, testDate)[0];
  return next ? { from: next.from, level: next.level } : null;
}

function thinOrNot({ outcome, headroom: { mayFall } }: Held, policy: Policy): Outcome {
  return outcome === 'met' && mayFall?.lt(policy.thinBelow) ? 'met, thin' : outcome;
}

/** Met, and within the band of the level: the line itself is in, the far edge of the band is out. */
const isJustPassing = ({ outcome, headroom: { shareOfLevel } }: Held, policy: Policy): boolean =>
  outcome === 'met' && shareOfLevel !== null && shareOfLevel.lt(policy.justPassingBand);

/** A waiver that has run out says so by itself: the failure stands alone again. */
function ranOut(granted: readonly Waiver[]): string | null {
  const last = granted.at(-1);
  return last?.until ? `waiver of ${formatDay(last.grantedOn)} ran out on ${formatDay(last.until)}` : null;
}

/** Capital expenditure begins anew with every financial year: next year's limit says nothing of this year's. */
const lastDayOfResult = (
  { measure }: Covenant,
  { fiscalYearEndMonth }: StatementBook,
  testDate: PlainDate,
): PlainDate | null =>
  measure === 'capital-expenditure'
    ? addMonthsToMonthEnd(lastYearEndBefore(testDate, fiscalYearEndMonth), 12)
    : null;

function againstLater(
  covenant: Covenant,
  { testDate, lastDay }: { readonly testDate: PlainDate; readonly lastDay: PlainDate | null },
  sides: Sides,
  tested: Decimal | null,
): CovenantTest['againstLaterLevels'] {
  return laterLevels(covenant.levels, testDate).flatMap(({ from, level }) => {
    if (level === null || (lastDay !== null && from > lastDay)) return [];
    const { operator, roundingPlaces } = covenant;
    const held = holdAgainstLevel(
      MEASURES[covenant.measure],
      sides,
      { operator, level, roundingPlaces },
      tested,
    );
    const { mayFall, shareOfLevel, moneyLeft, otherSideMayRise } = held.headroom;
    return [{ from, level, outcome: held.outcome, mayFall, shareOfLevel, moneyLeft, otherSideMayRise }];
  });
}
