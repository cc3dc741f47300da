import { describe, expect, test } from 'vitest';
import { addDays, type PlainDate } from '../calendar/plainDate.ts';
import { buildAddBack, buildCovenant, buildLevel, buildYear } from '../covenants/covenant.fixture.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { withAccrualsTakenOut, type EarningsInDoubt } from '../covenants/onAccruals.ts';
import { findingsOf } from './alertRules.ts';
import { justPassingRepeated } from './justPassingRepeated.ts';
import { metOnlyOnAccruals } from './metOnlyOnAccruals.ts';
import { pastOurTrigger } from './pastOurTrigger.ts';
import { buildContext, buildInputs } from './rule.fixture.ts';
import type { AlertContext } from './rule.ts';
import { runningOut } from './runningOut.ts';
import { stepDownAhead } from './stepDownAhead.ts';
import { testNotMet } from './testNotMet.ts';
import { thinHeadroom } from './thinHeadroom.ts';

const on: PlainDate = '2025-12-31';
const asOf: PlainDate = '2026-03-01';
const net = buildCovenant({ firstTestOn: on });
const certificate = {
  id: 1,
  kind: 'compliance certificate',
  everyMonths: 3,
  dueDays: 45,
  dayCount: 'calendar',
  graceDays: 0,
  firstPeriodEnd: on,
} as const;

const night = (covenant: Covenant, debt: number, day: PlainDate = asOf): AlertContext =>
  buildContext(
    buildInputs({
      covenants: [covenant],
      undertakings: [certificate],
      statements: buildYear(on, { ebitda: 12, debt, cash: 0 }),
    }),
    day,
  );

describe('waiver, cure running out', () => {
  const waivedUntil = (until: PlainDate | null): Covenant => ({
    ...net,
    waivers: [{ testDate: on, grantedOn: '2026-02-01', until, conditions: '' }],
  });

  test.each([
    [31, []],
    [30, ['soon']],
    [11, ['soon']],
    [10, ['urgent']],
    [0, ['urgent']],
    [-1, []],
  ] as const)('a waiver that ends in %i days: %j', (days, severities) => {
    const found = runningOut(night(waivedUntil(addDays(asOf, days)), 45));
    expect(found.map(({ severity }) => severity)).toEqual(severities);
  });

  test('of two waivers for one test names the one that stands', () => {
    const [waiver] = waivedUntil('2026-04-01').waivers;
    const ranOut = { ...waiver!, grantedOn: '2026-01-20', until: '2026-02-10' } as const;
    const [found] = testNotMet(night({ ...net, waivers: [ranOut, waiver!] }, 45));
    expect(found?.sentence).toContain('Waived on 1 Feb 2026.');
  });

  test('says what ends and when, and that the failure stands underneath', () => {
    expect(runningOut(night(waivedUntil('2026-03-11'), 45))).toMatchObject([
      {
        kind: 'waiver, cure running out',
        factDate: on,
        sentence:
          'Net leverage 3.75x, at most 3.50x on 31 Dec 2025: not met on our figures. The waiver ends on 11 Mar 2026, in 10 days.',
      },
    ]);
    expect(runningOut(night(waivedUntil(null), 45))).toEqual([]);
  });

  test('is found for a cure period, with what would cure', () => {
    const cureRights = {
      method: 'debt',
      withinBusinessDays: 15,
      mostInFour: 2,
      mostInLife: 5,
      curedByNextTest: false,
    } as const;
    const inPeriod = night({ ...net, cureRights }, 45);
    expect(runningOut(inPeriod)).toMatchObject([
      {
        severity: 'urgent',
        sentence: expect.stringContaining('The cure period ends on 6 Mar 2026, in 5 days.') as string,
        wouldChange: '3 put in as debt repaid, or a waiver that reaches further.',
      },
    ]);
    expect(testNotMet(inPeriod)).toMatchObject([
      { severity: 'urgent', sentence: expect.stringContaining('In cure period until 6 Mar 2026.') as string },
    ]);
    const cures = [
      { quarterEnd: on, method: 'debt', receivedOn: asOf, amount: net.levels[0]!.level! },
    ] as const;
    const cured = night({ ...net, cureRights, cures }, 45);
    expect([...runningOut(cured), ...testNotMet(cured)]).toEqual([]);
  });
});

describe('our own trigger', () => {
  const ours = { ...net, isOurs: true };

  test.each([
    ['at its level', 42, []],
    ['just above', 42.01, ['soon']],
  ] as const)('%s', (_where, debt, severities) => {
    const found = pastOurTrigger(night(ours, debt));
    expect(found.map(({ severity }) => severity)).toEqual(severities);
  });

  test('says that it is ours, and is never counted as a covenant that is not met', () => {
    const found = findingsOf(night(ours, 45));
    expect(found).toMatchObject([
      {
        kind: 'past our trigger',
        sentence: 'Our trigger, not in the agreement: Net leverage 3.75x, at most 3.50x: above our trigger.',
        wouldChange: 'EBITDA of 13 instead of 12 (1 more), or 3 less net debt.',
      },
    ]);
    expect(JSON.stringify(found)).not.toContain('not met');
    expect(found[0]?.evidence[0]).toEqual({
      label: 'Covenant',
      value: 'Net leverage, ours, not in the agreement',
    });
  });

  test('is a note where it is thin or where a later level would be passed, and no pattern', () => {
    const stepped = {
      ...ours,
      levels: [buildLevel('2025-01-01', '2026-04-30', '3.5'), buildLevel('2026-05-01', null, '3.25')],
    };
    const context = night(stepped, 41);
    expect(thinHeadroom(context)).toMatchObject([{ severity: 'note' }]);
    expect(stepDownAhead(context)).toMatchObject([
      { severity: 'note', sentence: expect.stringContaining('would be above our trigger') as string },
    ]);
    const repeated = { covenantId: 1, inBand: 6, ofLast: 6, run: 6, testDates: [on] };
    expect(justPassingRepeated({ ...context, patterns: [repeated] })).toEqual([]);
  });
});

describe('met only on accruals', () => {
  const without = (inDoubt: EarningsInDoubt, covenant = net, debt = 40): AlertContext => {
    const context = night(covenant, debt);
    return { ...context, tests: context.tests.map((one) => withAccrualsTakenOut(one, covenant, inDoubt)) };
  };

  test.each([
    ['just enough', { unexplained: 0.57, workingCapital: 0 }, []],
    ['just too much', { unexplained: 0.58, workingCapital: 0 }, ['soon']],
    ['below nought', { unexplained: -5, workingCapital: 0 }, []],
    ['working capital alone', { unexplained: 0, workingCapital: 5 }, []],
  ] as const)('%s', (_where, inDoubt, severities) => {
    // 40 / 3.5 = 11.43: EBITDA of 12 may lose 0.57.
    expect(metOnlyOnAccruals(without(inDoubt)).map(({ severity }) => severity)).toEqual(severities);
  });

  test('says both results, conditionally', () => {
    expect(metOnlyOnAccruals(without({ unexplained: 2, workingCapital: 0 }))).toMatchObject([
      {
        kind: 'met only on accruals',
        sentence:
          'Net leverage 3.33x, at most 3.50x; 4.00x without 2 of accruals that the peers do not show: would not have been met.',
        wouldChange: 'EBITDA without these accruals of 11 instead of 10.',
      },
    ]);
    expect(metOnlyOnAccruals(without({ unexplained: 2, workingCapital: 0 }, net, 45))).toEqual([]);
  });

  test('is found apart from add-backs: each kind speaks for itself', () => {
    const covenant = { ...net, addBacks: [buildAddBack(on, 2)] };
    const kinds = findingsOf(without({ unexplained: 2.3, workingCapital: 0 }, covenant, 42.5)).map(
      ({ kind }) => kind,
    );
    expect(kinds).toContain('met only with add-backs');
    expect(kinds).toContain('met only on accruals');
  });
});
