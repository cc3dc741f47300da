/** One covenant tested on one day, as the agreement defines it, on the figures known by another day. */
import { isSamePeriodEnd } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import { MEASURES } from '../measures/index.ts';
import type { Measured } from '../measures/measured.ts';
import type { InputUsed, MissingLine, Reading } from '../measures/measure.ts';
import type { Policy } from '../policy.ts';
import { knownStatements } from '../statements/currentStatements.ts';
import { lineItem } from '../statements/lineItems.ts';
import type { Statement } from '../statements/statement.ts';
import { withoutAddBacks } from './counterfactual.ts';
import type { Covenant, Waiver } from './covenant.ts';
import { isMet, isNotMet, type CovenantTest, type Outcome } from './covenantTest.ts';
import { fallOf, NO_HEADROOM, type Sides } from './headroom.ts';
import { holdAgainstLevel, type Held, type Terms } from './holdAgainstLevel.ts';
import { laterLevels, levelInForce } from './levels.ts';

/**
 * Tests a covenant on a test date with the statements received by `asOf`.
 *
 * Only met is met: figures that have not come are awaited, a line or an older period that is not there means that
 * it cannot be tested, a holiday or a day without a level is not tested though the ratio is shown, and a waived
 * test stays not met underneath. Amounts in whole units of the covenant's currency. Source: methods.md A4 to A6.
 *
 * @example testCovenant(covenant, statements, '2026-09-30', 12, policy, '2026-11-30').outcome // => 'met'
 */
export function testCovenant(
  covenant: Covenant,
  statements: readonly Statement[],
  testDate: PlainDate,
  fiscalYearEndMonth: number,
  policy: Policy,
  asOf: PlainDate,
): CovenantTest {
  const known = knownStatements(statements, { scope: covenant.scope, asOf });
  const measure = MEASURES[covenant.measure];
  const measured = measure.measure({
    statements: known,
    date: testDate,
    fiscalYearEndMonth,
    definition: covenant.definition,
    addBacks: covenant.addBacks,
  });
  const inForce = levelInForce(covenant.levels, testDate);
  const level = inForce.kind === 'level' ? inForce.level : null;
  const inputs = inputsOf(measured);
  const sides = sidesOf(measured);
  const terms: Terms | null = level && {
    operator: covenant.operator,
    level,
    roundingPlaces: covenant.roundingPlaces,
  };
  const held =
    notTested(covenant, testDate, inForce.kind, sides) ??
    withoutFigures(measured, testDate) ??
    otherCurrency(covenant, known, inputs) ??
    (sides && terms ? holdAgainstLevel(measure, sides, terms) : null);
  if (!held) throw new Error(`covenant ${covenant.id} on ${testDate}: figures and level known, nothing held`);

  const underlyingOutcome = thinOrNot(held, policy);
  const isLive = isMet(held.outcome) || isNotMet(held.outcome);
  const waiver = waiverOf(covenant.waivers, testDate, asOf);
  const next = laterLevels(covenant.levels, testDate)[0];
  return {
    covenantId: covenant.id,
    measure: covenant.measure,
    testDate,
    operator: covenant.operator,
    level,
    nextLevel: next ? { from: next.from, level: next.level } : null,
    tested: held.tested,
    numerator: sides?.numerator ?? null,
    denominator: sides?.denominator ?? null,
    outcome: waiver && isNotMet(underlyingOutcome) ? 'not met, waived' : underlyingOutcome,
    underlyingOutcome,
    reason: remarks(covenant, held, isLive && restsOnUntied(known, inputs)),
    headroom: { ...NO_HEADROOM, ...held.headroom, fallOf: fallOf(measure) },
    againstLaterLevels: isLive && sides ? againstLater(covenant, testDate, sides) : [],
    justPassing: isJustPassing(held, policy),
    bridge: measured.bridge,
    counterfactuals:
      isLive && sides && terms ? withoutAddBacks(measure, sides, terms, measured.addBacksTaken) : [],
    inputs,
    missing: missingOf(measured),
  };
}

const readingsOf = ({ numerator, denominator }: Measured): readonly Reading[] =>
  denominator ? [numerator, denominator] : [numerator];

const inputsOf = (measured: Measured): readonly InputUsed[] =>
  readingsOf(measured).flatMap((reading) => (reading.kind === 'missing' ? [] : reading.inputs));

function missingOf(measured: Measured): readonly MissingLine[] {
  const gaps = readingsOf(measured).flatMap((reading) => (reading.kind === 'missing' ? reading.missing : []));
  const byKey = new Map(gaps.map((gap) => [`${gap.line} ${gap.periodEnd} ${gap.months}`, gap]));
  return [...byKey.values()];
}

function sidesOf({ numerator, denominator }: Measured): Sides | null {
  if (numerator.kind !== 'value' || (denominator && denominator.kind !== 'value')) return null;
  return { numerator: numerator.value, denominator: denominator ? denominator.value : null };
}

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
function withoutFigures(measured: Measured, testDate: PlainDate): Held | null {
  const missing = missingOf(measured);
  if (missing.some(({ line, periodEnd }) => line === 'statement' && isSamePeriodEnd(periodEnd, testDate)))
    return nothingHeld('awaiting figures', `figures to ${formatDay(testDate)} are not there`);
  if (missing.length > 0)
    return nothingHeld('cannot be tested', `missing: ${missing.map(gapInWords).join(', ')}`);
  const refused = readingsOf(measured).find((reading) => reading.kind === 'not-meaningful');
  return refused?.kind === 'not-meaningful' ? nothingHeld('cannot be tested', refused.reason) : null;
}

function gapInWords({ line, periodEnd, months }: MissingLine): string {
  const what = line === 'statement' ? 'figures' : lineItem(line).label;
  return months === 0
    ? `${what} on ${formatDay(periodEnd)}`
    : `${what} of ${months} months to ${formatDay(periodEnd)}`;
}

function otherCurrency(
  { currency }: Covenant,
  known: readonly Statement[],
  inputs: readonly InputUsed[],
): Held | null {
  const foreign = behind(known, inputs).find((statement) => statement.currency !== currency);
  return foreign
    ? nothingHeld(
        'cannot be tested',
        `figures in ${foreign.currency}, covenant in ${currency}: no rate is recorded`,
      )
    : null;
}

const restsOnUntied = (known: readonly Statement[], inputs: readonly InputUsed[]): boolean =>
  behind(known, inputs).some(({ tie }) => tie === 'does-not-tie');

/** Why the outcome is what it is, and what it rests on; null where there is nothing to say. */
function remarks({ roundingPlaces }: Covenant, held: Held, isUntied: boolean): string | null {
  const said = [
    held.reason,
    held.roundingDecides ? `at the ${roundingPlaces} decimal places that the agreement rounds to` : null,
    isUntied ? 'rests on figures that do not tie' : null,
  ].filter((remark) => remark !== null);
  return said.length > 0 ? said.join('; ') : null;
}

const behind = (known: readonly Statement[], inputs: readonly InputUsed[]): readonly Statement[] =>
  known.filter(({ id }) => inputs.some(({ statementId }) => statementId === id));

const nothingHeld = (outcome: Outcome, reason: string): Held => ({
  tested: null,
  outcome,
  reason,
  roundingDecides: false,
  headroom: { ...NO_HEADROOM, fallOf: 'earnings' },
});

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
