import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { addDays } from '../calendar/plainDate.ts';
import { buildAddBack, buildCovenant, buildLevel, buildYear } from '../covenants/covenant.fixture.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { justPassingRepeated } from './justPassingRepeated.ts';
import { metOnlyWithAddBacks } from './metOnlyWithAddBacks.ts';
import { buildContext, buildInputs, buildQuality } from './rule.fixture.ts';
import type { AlertRule } from './rule.ts';
import { stepDownAhead } from './stepDownAhead.ts';
import { testNotMet } from './testNotMet.ts';
import { thinHeadroom } from './thinHeadroom.ts';

const on: PlainDate = '2025-12-31';
const asOf: PlainDate = '2026-03-15';
const find = (
  rule: AlertRule,
  covenant: Covenant,
  figures: { ebitda: number; debt: number; cash?: number },
) =>
  rule(
    buildContext(
      buildInputs({ covenants: [covenant], statements: buildYear(on, { cash: 0, ...figures }) }),
      asOf,
    ),
  );
const net = buildCovenant({ firstTestOn: on });

describe('test not met', () => {
  test('is urgent, with the figures and what would change it', () => {
    expect(find(testNotMet, net, { ebitda: 12, debt: 45 })).toMatchObject([
      {
        kind: 'test not met',
        severity: 'urgent',
        covenantId: 1,
        factDate: on,
        sentence: 'Net leverage 3.75x, at most 3.50x: not met on our figures.',
        wouldChange: 'EBITDA of 13 instead of 12 (1 more), or 3 less net debt.',
      },
    ]);
  });

  test('is found in every form and never where the test is met', () => {
    expect(find(testNotMet, net, { ebitda: 12, debt: 42 })).toEqual([]);
    expect(find(testNotMet, net, { ebitda: -8, debt: 40 })).toMatchObject([
      { sentence: expect.stringContaining('has no meaning, at most 3.50x (earnings not positive') as string },
    ]);
    const waivers = [{ testDate: on, grantedOn: asOf, until: null, conditions: 'fee' }];
    expect(find(testNotMet, { ...net, waivers }, { ebitda: 12, debt: 45 })).toMatchObject([
      { severity: 'urgent', sentence: expect.stringContaining('Waived on 15 Mar 2026.') as string },
    ]);
  });

  test('at a level that has to be passed, or by rounding alone, says the level and no amount to find', () => {
    const strict = { ...net, operator: '<' as const };
    expect(find(testNotMet, strict, { ebitda: 12, debt: 42 })).toMatchObject([
      { wouldChange: 'Net leverage less than 3.50x, as the agreement compares.' },
    ]);
    expect(find(testNotMet, { ...strict, roundingPlaces: 2 }, { ebitda: 12, debt: 41.99 })).toMatchObject([
      { wouldChange: 'Net leverage less than 3.50x, as the agreement compares.' },
    ]);
  });

  test('never prints what the product does not say', () => {
    const [finding] = find(testNotMet, net, { ebitda: 12, debt: 45 });
    expect(JSON.stringify(finding)).not.toMatch(/breach|default|fraud/i);
  });
});

describe('thin headroom', () => {
  test('is raised under 10 % and not at 10 %', () => {
    expect(find(thinHeadroom, net, { ebitda: 10_000_000, debt: 31_500_000 })).toEqual([]);
    expect(find(thinHeadroom, net, { ebitda: 10_000_000, debt: 31_535_000 })).toMatchObject([
      {
        severity: 'soon',
        sentence: 'Net leverage 3.15x, at most 3.50x. EBITDA may fall 9.9\u00a0% (990.0k).',
        wouldChange: 'EBITDA of 10.01m instead of 10.00m (11.1k more) leaves 10\u00a0%.',
      },
    ]);
    expect(find(thinHeadroom, net, { ebitda: 10_000_000, debt: 31_501_000 })).toMatchObject([
      { sentence: expect.stringContaining('may fall 9.997\u00a0%') as string },
    ]);
  });

  test('says so where only the rounding of the agreement makes it met', () => {
    expect(find(thinHeadroom, { ...net, roundingPlaces: 2 }, { ebitda: 12, debt: 42.048 })).toMatchObject([
      { sentence: 'Net leverage 3.504x, at most 3.50x: met only as the agreement rounds.' },
    ]);
  });

  test('is not raised for a test that is not met', () => {
    expect(find(thinHeadroom, net, { ebitda: 12, debt: 45 })).toEqual([]);
  });
});

describe('met only with add-backs', () => {
  test('says the result without them and the share that is needed', () => {
    const covenant = { ...net, addBacks: [buildAddBack(on, 2)] };
    expect(find(metOnlyWithAddBacks, covenant, { ebitda: 11, debt: 42 })).toMatchObject([
      {
        severity: 'soon',
        sentence:
          'Net leverage 3.23x as reported, at most 3.50x; 3.82x without 2 of add-backs: would not have been met. Needs at least 50.0\u00a0% of the add-backs.',
        wouldChange: 'EBITDA before add-backs of 12 instead of 11.',
      },
    ]);
  });

  test('is silent where the test is met without them, or not met with them', () => {
    const covenant = { ...net, addBacks: [buildAddBack(on, 2)] };
    expect(find(metOnlyWithAddBacks, covenant, { ebitda: 12, debt: 42 })).toEqual([]);
    expect(find(metOnlyWithAddBacks, covenant, { ebitda: 9, debt: 42 })).toEqual([]);
  });
});

describe('step-down ahead', () => {
  const within = (days: number) => ({
    ...net,
    levels: [
      buildLevel('2025-01-01', addDays(asOf, days - 1), '3.5'),
      buildLevel(addDays(asOf, days), null, '3.0'),
    ],
  });

  test.each([
    [90, 'soon'],
    [91, 'note'],
    [180, 'note'],
  ] as const)('in %i days is a %s', (days, severity) => {
    expect(find(stepDownAhead, within(days), { ebitda: 10, debt: 32 })).toMatchObject([
      { severity, wouldChange: 'EBITDA of 11 instead of 10 (1 more).' },
    ]);
  });

  test('further away, or met at the later level, is no alert', () => {
    expect(find(stepDownAhead, within(181), { ebitda: 10, debt: 32 })).toEqual([]);
    expect(find(stepDownAhead, within(30), { ebitda: 10, debt: 30 })).toEqual([]);
  });

  test('that came into force after the test waits for the next one', () => {
    expect(find(stepDownAhead, within(-10), { ebitda: 10, debt: 32 })).toMatchObject([
      { severity: 'soon', sentence: expect.stringContaining('3.20x would not be met') as string },
    ]);
  });
});

describe('just passing, repeated', () => {
  const dates: readonly PlainDate[] = ['2023-12-31', '2024-12-31', '2025-12-31'];
  const yearly = buildCovenant({
    firstTestOn: '2023-12-31',
    everyMonths: 12,
    levels: [buildLevel('2023-01-01', null, '3.5')],
  });
  const found = (debts: readonly number[], quality = buildQuality(), covenant = yearly) =>
    justPassingRepeated(
      buildContext(
        buildInputs({
          covenants: [covenant],
          statements: debts.flatMap((debt, k) => buildYear(dates[k]!, { ebitda: 10, debt, cash: 0 })),
        }),
        asOf,
        quality,
      ),
    );

  test('counts k of n and the run, and is a note', () => {
    expect(found([34.5, 34.6, 34.7])).toMatchObject([
      {
        severity: 'note',
        factDate: on,
        sentence: 'Net leverage 3.47x, at most 3.50x. Third test in a row just passing, 3 of the last 3.',
        wouldChange: 'Next tests at 3.43x or less, 2\u00a0% from the level.',
      },
    ]);
  });

  test('counts on after the tenth in a row', () => {
    const pattern = { covenantId: 1, inBand: 6, ofLast: 6, run: 22, testDates: dates };
    const context = {
      ...buildContext(
        buildInputs({ covenants: [yearly], statements: buildYear(on, { ebitda: 10, debt: 34.5, cash: 0 }) }),
        asOf,
      ),
      patterns: [pattern],
    };
    expect(justPassingRepeated(context)[0]?.sentence).toMatch(
      /22 tests in a row just passing, 6 of the last 6\.$/,
    );
  });

  test('needs three: two of three are no alert', () => {
    expect(found([34.5, 30, 34.7])).toEqual([]);
  });

  test('is soon where quality is under 45, and a note at 45', () => {
    expect(found([34.5, 34.6, 34.7], buildQuality({ headline: 44.9 }))).toMatchObject([{ severity: 'soon' }]);
    expect(found([34.5, 34.6, 34.7], buildQuality({ headline: 45 }))).toMatchObject([{ severity: 'note' }]);
  });

  test('is soon where the latest is met only with add-backs', () => {
    const covenant = { ...yearly, addBacks: [buildAddBack(on, 0.1)] };
    expect(found([34.5, 34.6, 35.2], buildQuality(), covenant)).toMatchObject([{ severity: 'soon' }]);
  });
});
