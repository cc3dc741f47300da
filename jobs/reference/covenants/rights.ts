import { z } from 'zod';
import { addDays, type PlainDate } from '#core/calendar/plainDate.ts';
import type { CovenantLevel } from '#core/covenants/covenant.ts';
import { cureAmount, curesUsed, ebitdaWithCure } from '#core/covenants/equityCure.ts';
import { holdAgainstLevel } from '#core/covenants/holdAgainstLevel.ts';
import { isSprung, utilisation } from '#core/covenants/springing.ts';
import { testCovenant } from '#core/covenants/testCovenant.ts';
import { netLeverage } from '#core/measures/netLeverage.ts';
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { POLICY_VERSION_1 } from '#core/policy.ts';
import type { Statement } from '#core/statements/statement.ts';
import { openBook } from '#core/statements/statementBook.ts';
import type { Topic } from '../topic.ts';
import { amount, atMost, day, status } from './amounts.ts';
import { mixedVersions } from './periods.ts';
import { netLeverageCovenant, yearWith } from './statements.ts';

const ONE = decimal(1);
const BEGINNING = '1970-01-01';
const SOME_TEST_DATE = '2025-12-31';

/** Net leverage tested on statements with just these figures. */
function tested(
  levels: readonly CovenantLevel[],
  statements: readonly Statement[],
  testDate: PlainDate,
  asOf: PlainDate = addDays(testDate, 90),
  waivers: Parameters<typeof netLeverageCovenant>[2] = [],
) {
  const covenant = netLeverageCovenant(levels, BEGINNING, waivers);
  const book = openBook(statements, { scope: covenant.scope, asOf }, 12);
  return testCovenant(covenant, book, testDate, POLICY_VERSION_1, asOf);
}

const always = (level: Decimal): readonly CovenantLevel[] => [
  { from: BEGINNING, until: null, level, isReset: false },
];

const schedule: Topic = (inputs) => {
  const given = z
    .strictObject({
      schedule: z.array(z.strictObject({ until: day.nullable(), max: amount })),
      test_date: day,
      ratio: amount,
    })
    .parse(inputs);
  const levels = given.schedule.map(({ until, max }, index) => {
    const before = given.schedule[index - 1]?.until;
    return { from: before ? addDays(before, 1) : BEGINNING, until, level: max, isReset: false };
  });
  const test = tested(
    levels,
    yearWith(given.test_date, { ebitda: ONE, netDebt: given.ratio }),
    given.test_date,
  );
  const next = test.againstLaterLevels[0];
  return {
    threshold: test.level,
    status: status(test.outcome),
    headroom_abs: test.headroom.absolute,
    next_threshold: next?.level ?? null,
    status_at_next: next ? status(next.outcome) : null,
    headroom_abs_next:
      next && test.tested
        ? holdAgainstLevel(netLeverage, { numerator: test.tested, denominator: ONE }, atMost(next.level))
            .headroom.absolute
        : null,
  };
};

const springing: Topic = (inputs) => {
  const given = z
    .strictObject({
      commitment: amount,
      drawn: amount,
      letters_of_credit_excluded: amount.optional(),
      trigger: amount,
      ratio: amount,
      max: amount,
    })
    .parse(inputs);
  const held = holdAgainstLevel(netLeverage, { numerator: given.ratio, denominator: ONE }, atMost(given.max));
  return {
    utilisation: utilisation(given.drawn, given.commitment),
    status: isSprung(given) ? status(held.outcome) : 'not tested',
    ratio: held.tested,
    headroom_abs: held.headroom.absolute,
  };
};

const cure: Topic = (inputs) => {
  const given = z
    .union([
      z.strictObject({
        net_debt: amount,
        ebitda: amount,
        max: amount,
        method: z.enum(['ebitda', 'debt', 'both']),
      }),
      z.strictObject({
        cured_quarters: z.array(day),
        test_date: day,
        max_in_four: z.number(),
        max_life: z.number(),
      }),
      z.strictObject({ cure_quarter: day, cure: amount, ltm_ebitda_reported: z.record(z.string(), amount) }),
    ])
    .parse(inputs);
  if ('method' in given)
    return {
      cure: cureAmount({
        debt: given.net_debt,
        ebitda: given.ebitda,
        level: given.max,
        method: given.method,
      }),
    };
  if ('cured_quarters' in given) {
    const { usedInFour, usedInLife, available } = curesUsed({
      curedQuarters: given.cured_quarters,
      testDate: given.test_date,
      mostInFour: given.max_in_four,
      mostInLife: given.max_life,
    });
    return { used_in_four: usedInFour, used_in_life: usedInLife, available };
  }
  const counted = { quarter: given.cure_quarter, amount: given.cure };
  return {
    ltm_for_covenant: Object.fromEntries(
      Object.entries(given.ltm_ebitda_reported).map(([date, reported]) => [
        date,
        ebitdaWithCure(reported, day.parse(date), counted),
      ]),
    ),
  };
};

const waiver: Topic = (inputs) => {
  const given = z
    .strictObject({
      net_debt: amount,
      ebitda: amount,
      max: amount,
      waiver: z.strictObject({ test_date: day }),
    })
    .parse(inputs);
  const testDate = given.waiver.test_date;
  const statements = yearWith(testDate, { ebitda: given.ebitda, netDebt: given.net_debt });
  const granted = { testDate, grantedOn: testDate, until: null, conditions: '' };
  const test = tested(always(given.max), statements, testDate, undefined, [granted]);
  return {
    status: status(test.outcome),
    underlying: status(test.underlyingOutcome),
    headroom_abs: test.headroom.absolute,
  };
};

const reset: Topic = (inputs) => {
  const given = z
    .strictObject({
      original: amount,
      amendments: z.array(z.strictObject({ from: day, max: amount })),
      tests: z.record(z.string(), amount),
    })
    .parse(inputs);
  const levels = [
    ...always(given.original),
    ...given.amendments.map(({ from, max }) => ({ from, until: null, level: max, isReset: true })),
  ];
  return {
    status: Object.fromEntries(
      Object.entries(given.tests).map(([date, ratio]) => {
        const testDate = day.parse(date);
        const statements = yearWith(testDate, { ebitda: ONE, netDebt: ratio });
        return [date, status(tested(levels, statements, testDate).outcome)];
      }),
    ),
  };
};

const restatementInputs = z.strictObject({
  net_debt: amount,
  ebitda_original: amount,
  ebitda_restated: amount,
  max: amount,
});

const restatement: Topic = (inputs) => {
  const parsed = restatementInputs.safeParse(inputs);
  if (!parsed.success) return mixedVersions(inputs);
  const given = parsed.data;
  const restatedOn = addDays(SOME_TEST_DATE, 60);
  const statements = [
    ...yearWith(SOME_TEST_DATE, { ebitda: given.ebitda_original, netDebt: given.net_debt }),
    ...yearWith(
      SOME_TEST_DATE,
      { ebitda: given.ebitda_restated, netDebt: given.net_debt },
      { id: 3, version: 2, receivedOn: restatedOn },
    ),
  ];
  const before = tested(always(given.max), statements, SOME_TEST_DATE, addDays(restatedOn, -1));
  const after = tested(always(given.max), statements, SOME_TEST_DATE, restatedOn);
  return {
    original: before.tested,
    restated: after.tested,
    status_original: status(before.outcome),
    status_restated: status(after.outcome),
  };
};

export const rightsTopics: Readonly<Record<string, Topic>> = {
  schedule,
  springing,
  cure,
  waiver,
  reset,
  restatement,
};
