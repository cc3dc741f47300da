/** One covenant tested on one day, as the agreement defines it, on the figures known by another day. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { MEASURES } from '../measures/index.ts';
import type { Policy } from '../policy.ts';
import { daysOfFlow, DAYS_OF_LONGEST_YEAR, lengthInWords } from '../statements/periodLength.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { withoutAddBacks } from './counterfactual.ts';
import type { Covenant, Waiver } from './covenant.ts';
import { isNotMet, type CovenantTest, type Outcome } from './covenantTest.ts';
import { figuresOf, type Figures } from './figures.ts';
import { fallOf, type Sides } from './headroom.ts';
import { holdAgainstLevel, type Held, type Terms } from './holdAgainstLevel.ts';
import { hasResult } from './latestLiveTest.ts';
import { laterLevels, levelInForce } from './levels.ts';
import { withoutResult } from './withoutResult.ts';

/**
 * Tests a covenant on a test date out of the book of its scope; `asOf` says which waivers stand.
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
): CovenantTest {
  const figures = figuresOf(covenant, book, testDate);
  const inForce = levelInForce(covenant.levels, testDate);
  const level = inForce.kind === 'level' ? inForce.level : null;
  const nothing = withoutResult(covenant, testDate, inForce, figures);
  const { measure, operator, roundingPlaces } = covenant;
  const common = {
    covenantId: covenant.id,
    measure,
    testDate,
    operator,
    level,
    nextLevel: nextLevelOf(covenant, testDate),
    numerator: figures.sides?.numerator ?? null,
    denominator: figures.sides?.denominator ?? null,
    bridge: figures.bridge,
    inputs: figures.inputs,
    missing: figures.missing,
  };
  if (nothing) return { ...common, ...nothingSaid(nothing, covenant) };
  if (!figures.sides || !level)
    throw new Error(`covenant ${covenant.id} on ${testDate}: no sides or no level`);
  const terms = { operator, level, roundingPlaces };
  return { ...common, ...resultSaid(covenant, figures, figures.sides, terms, { testDate, policy, asOf }) };
}

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
});

function resultSaid(
  covenant: Covenant,
  figures: Figures,
  sides: Sides,
  terms: Terms,
  on: { readonly testDate: PlainDate; readonly policy: Policy; readonly asOf: PlainDate },
): Said {
  const measure = MEASURES[covenant.measure];
  const held = holdAgainstLevel(measure, sides, terms);
  const underlyingOutcome = thinOrNot(held, on.policy);
  const isWaived = isNotMet(underlyingOutcome) && waiverOf(covenant.waivers, on.testDate, on.asOf);
  return {
    tested: held.tested,
    outcome: isWaived ? 'not met, waived' : underlyingOutcome,
    underlyingOutcome,
    reason: remarks(covenant, held, figures),
    headroom: held.headroom,
    againstLaterLevels: hasResult(held) ? againstLater(covenant, on.testDate, sides) : [],
    justPassing: isJustPassing(held, on.policy),
    counterfactuals: hasResult(held) ? withoutAddBacks(measure, sides, terms, figures.addBacksTaken) : [],
  };
}

/** Why the outcome is what it is, and what it rests on; null where there is nothing to say. */
function remarks({ roundingPlaces }: Covenant, held: Held, figures: Figures): string | null {
  const said = [
    held.reason,
    held.roundingDecides ? `at the ${roundingPlaces} decimal places that the agreement rounds to` : null,
    ...(hasResult(held) ? restsOnWhat(figures) : []),
  ].filter((remark) => remark !== null);
  return said.length > 0 ? said.join('; ') : null;
}

function restsOnWhat({ statements, inputs }: Figures): readonly (string | null)[] {
  const frameworks = [...new Set(statements.map(({ framework }) => framework))].sort();
  const days = daysOfFlow(statements, inputs);
  return [
    statements.some(({ tie }) => tie === 'does-not-tie') ? 'rests on figures that do not tie' : null,
    frameworks.length > 1
      ? `rests on ${frameworks.length === 2 ? 'two' : frameworks.length} accounting frameworks: ${frameworks.join(', ')}`
      : null,
    days !== null && days > DAYS_OF_LONGEST_YEAR ? `rests on ${lengthInWords(days)}` : null,
  ];
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

/** One test date each; one that was granted later, or has run out, is not there. */
const waiverOf = (waivers: readonly Waiver[], testDate: PlainDate, asOf: PlainDate): Waiver | undefined =>
  waivers.find(
    (waiver) =>
      waiver.testDate === testDate &&
      waiver.grantedOn <= asOf &&
      (waiver.until === null || asOf <= waiver.until),
  );

function againstLater(
  covenant: Covenant,
  testDate: PlainDate,
  sides: Sides,
): CovenantTest['againstLaterLevels'] {
  return laterLevels(covenant.levels, testDate).flatMap(({ from, level }) => {
    if (level === null) return [];
    const { operator, roundingPlaces } = covenant;
    const held = holdAgainstLevel(MEASURES[covenant.measure], sides, { operator, level, roundingPlaces });
    return [{ from, level, outcome: held.outcome, mayFall: held.headroom.mayFall }];
  });
}
