/** How far a borrower's figures may move before its tests are not met: one at a time, together, and in two scenarios. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { isShort, type CovenantTest, type Outcome } from '../covenants/covenantTest.ts';
import { verdictOn } from '../covenants/holdAgainstLevel.ts';
import { hasResult, latestLiveTest } from '../covenants/latestLiveTest.ts';
import { shownOutcome } from '../covenants/rights.ts';
import { MEASURES } from '../measures/index.ts';
import { decimal, type Decimal } from '../money/decimal.ts';
import type { OutlookPolicy } from '../policy.ts';
import type { Books } from '../statements/statementBook.ts';
import { isReached, sidesAfter, type Blow, type Struck } from './blow.ts';
import { shareBeforeNotMet } from './breakEven.ts';
import { blowOf, NO_FALLS, scenarioBase, type Falls, type ScenarioBase } from './scenario.ts';

export const FACTORS = ['earnings', 'sales', 'working capital', 'rates', 'together'] as const;
export type Factor = (typeof FACTORS)[number];

export const SCENARIOS = ['slower sales', 'dearer money'] as const;
export type ScenarioName = (typeof SCENARIOS)[number];

export interface Sensitivity {
  /** What was assumed. */
  readonly policy: OutlookPolicy;
  /** The latest live test of each covenant that has a result. */
  readonly tests: readonly TestSensitivity[];
}

export interface TestSensitivity {
  readonly covenantId: number;
  readonly testDate: PlainDate;
  readonly breakEvens: Readonly<Record<Factor, BreakEven>>;
  readonly scenarios: Readonly<Record<ScenarioName, ScenarioResult>>;
}

export type BreakEven =
  /**
   * It may move by this share: of EBITDA as the test has it, of twelve months' sales, of receivables and stocks, of
   * floating debt a year. `amount` is the same in money; null for the three together.
   */
  | { readonly kind: 'at'; readonly share: Decimal; readonly amount: Decimal | null }
  | { readonly kind: 'not met already' }
  /** The test does not rest on it. */
  | { readonly kind: 'not reached' }
  /** Not even the whole of it. */
  | { readonly kind: 'never' }
  | { readonly kind: 'unknown'; readonly reason: string };

export type ScenarioResult =
  | { readonly kind: 'computed'; readonly tested: Decimal | null; readonly outcome: Outcome }
  | { readonly kind: 'unknown'; readonly reason: string };

/** Rates are looked at up to a rise of the whole of floating debt a year; the others up to all of their base. */
const WHOLE = decimal(1);
const FALLS: Readonly<Record<Factor, Falls>> = {
  earnings: { ...NO_FALLS, earningsFall: WHOLE },
  sales: { ...NO_FALLS, salesFall: WHOLE },
  'working capital': { ...NO_FALLS, workingCapitalLoss: WHOLE },
  rates: { ...NO_FALLS, rateRise: WHOLE },
  together: { ...NO_FALLS, earningsFall: WHOLE, salesFall: WHOLE, workingCapitalLoss: WHOLE },
};

/**
 * Break-evens and scenarios of every latest live test with a result, on the figures of its own test date.
 *
 * First order: interest, tax and the agreement's add-backs stay as they are when earnings fall. Source: methods.md A5
 * for what earnings may fall by; the rest is arithmetic on the policy's assumptions.
 *
 * @example sensitivity([covenant], [test], openBooks({ statements, fiscalYearEndMonth: 12 }, '2026-11-30'), POLICY_VERSION_1.outlook).tests[0]?.breakEvens.earnings // => { kind: 'at', share: 0.14285…, amount: 1857142.857… }
 */
export const sensitivity = (
  covenants: readonly Covenant[],
  tests: readonly CovenantTest[],
  books: Books,
  policy: OutlookPolicy,
): Sensitivity => ({
  policy,
  tests: covenants.flatMap((covenant) => {
    const test = latestLiveTest(tests, covenant.id);
    const { numerator, level } = test ?? {};
    if (!test || !numerator || !level || !hasResult(test)) return [];
    const base = scenarioBase(test, books[covenant.scope]);
    const struck: Struck = {
      measure: covenant.measure,
      definition: covenant.definition,
      sides: { numerator, denominator: test.denominator },
      cash: base.cash,
    };
    return [testSensitivity({ covenant, test, level, base, struck, policy })];
  }),
});

interface Asked {
  readonly covenant: Covenant;
  readonly test: CovenantTest;
  readonly level: Decimal;
  readonly base: ScenarioBase;
  readonly struck: Struck;
  readonly policy: OutlookPolicy;
}

const testSensitivity = (asked: Asked): TestSensitivity => ({
  covenantId: asked.covenant.id,
  testDate: asked.test.testDate,
  breakEvens: {
    earnings: breakEven(asked, 'earnings'),
    sales: breakEven(asked, 'sales'),
    'working capital': breakEven(asked, 'working capital'),
    rates: breakEven(asked, 'rates'),
    together: breakEven(asked, 'together'),
  },
  scenarios: {
    'slower sales': scenarioResult(asked, { ...NO_FALLS, ...asked.policy.slowerSales }),
    'dearer money': scenarioResult(asked, { ...NO_FALLS, ...asked.policy.dearerMoney }),
  },
});

function breakEven(asked: Asked, factor: Factor): BreakEven {
  const { test, level, base, struck } = asked;
  if (isShort(test.underlyingOutcome)) return { kind: 'not met already' };
  if (!isReached(struck.measure, REACHES[factor])) return { kind: 'not reached' };
  const blow = reachingBlow(asked, FALLS[factor]);
  if ('missing' in blow) return { kind: 'unknown', reason: blow.missing };
  if (factor === 'earnings' && !base.earnings) return { kind: 'unknown', reason: 'no positive earnings' };
  const share = shareBeforeNotMet(struck, { operator: test.operator, level }, blow);
  return share
    ? { kind: 'at', share, amount: amountOf(asked, factor)?.times(share) ?? null }
    : { kind: 'never' };
}

const UNIT: Blow = { earnings: WHOLE, cash: WHOLE, interest: WHOLE };
/** Which parts of a blow a factor has, whatever their size. */
const REACHES: Readonly<Record<Factor, Blow>> = {
  earnings: { ...UNIT, cash: decimal(0), interest: decimal(0) },
  sales: { ...UNIT, cash: decimal(0), interest: decimal(0) },
  'working capital': { ...UNIT, earnings: decimal(0), interest: decimal(0) },
  rates: { ...UNIT, earnings: decimal(0), cash: decimal(0) },
  together: { ...UNIT, interest: decimal(0) },
};

/** A base that is missing matters only where the test rests on what it is the base of. */
function reachingBlow({ struck: { measure }, base, policy }: Asked, falls: Falls): ReturnType<typeof blowOf> {
  const onEarnings = isReached(measure, REACHES.earnings);
  const onCash = isReached(measure, REACHES['working capital']);
  const onInterest = isReached(measure, REACHES.rates);
  return blowOf(
    {
      earningsFall: onEarnings ? falls.earningsFall : NO_FALLS.earningsFall,
      salesFall: onEarnings ? falls.salesFall : NO_FALLS.salesFall,
      workingCapitalLoss: onCash ? falls.workingCapitalLoss : NO_FALLS.workingCapitalLoss,
      rateRise: onInterest ? falls.rateRise : NO_FALLS.rateRise,
    },
    base,
    policy,
  );
}

function amountOf({ base, policy }: Asked, factor: Factor): Decimal | null {
  switch (factor) {
    case 'earnings':
      return base.earnings;
    case 'sales':
      return base.sales;
    case 'working capital':
      return base.workingCapital;
    case 'rates':
      return base.debt && base.debt.times(policy.floatingDebtShare);
    case 'together':
      return null;
  }
}

function scenarioResult(asked: Asked, falls: Falls): ScenarioResult {
  const { covenant, test, level, struck } = asked;
  const blow = reachingBlow(asked, falls);
  if ('missing' in blow) return { kind: 'unknown', reason: blow.missing };
  const { tested, outcome } = verdictOn(MEASURES[covenant.measure], sidesAfter(struck, blow, WHOLE), {
    operator: test.operator,
    level,
    roundingPlaces: covenant.roundingPlaces,
  });
  return { kind: 'computed', tested, outcome: shownOutcome(covenant, outcome) };
}

/**
 * The test that is not met first as a factor moves, of those that are met; null where none is.
 *
 * @example firstNotMet([], 'sales') // => null
 */
export function firstNotMet(
  tests: readonly TestSensitivity[],
  factor: Factor,
): { readonly covenantId: number; readonly share: Decimal; readonly amount: Decimal | null } | null {
  return atBreakEven(tests, factor).reduce<ReturnType<typeof atBreakEven>[number] | null>(
    (first, one) => (first && first.share.lte(one.share) ? first : one),
    null,
  );
}

const atBreakEven = (tests: readonly TestSensitivity[], factor: Factor) =>
  tests.flatMap(({ covenantId, breakEvens }) => {
    const found = breakEvens[factor];
    return found.kind === 'at' ? [{ covenantId, share: found.share, amount: found.amount }] : [];
  });

/**
 * The smallest equal fall of sales, earnings, receivables and stocks at which no test is met any more. Null where some
 * test stays met, or cannot be told.
 *
 * @example everyNotMet([]) // => null
 */
export function everyNotMet(tests: readonly TestSensitivity[]): Decimal | null {
  const shares = tests.map(({ breakEvens: { together } }) =>
    together.kind === 'at' ? together.share : together.kind === 'not met already' ? decimal(0) : null,
  );
  return shares.reduce<Decimal | null>(
    (most, share, place) => (share && (place === 0 || most) ? (most?.gt(share) ? most : share) : null),
    null,
  );
}
