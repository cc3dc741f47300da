import { describe, expect, test } from 'vitest';
import type { Undertaking } from '../borrowerInputs.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { buildContext, buildInputs } from './rule.fixture.ts';
import { statementLate } from './statementLate.ts';

const quarterly: Undertaking = {
  id: 1,
  kind: 'quarterly accounts',
  everyMonths: 3,
  dueDays: 45,
  dayCount: 'calendar',
  graceDays: 10,
  firstPeriodEnd: '2026-06-30',
};
const june = buildStatement('2026-06-30', 6, { revenue: 1 }, { receivedOn: '2026-08-01' });
const late = (
  asOf: PlainDate,
  undertaking: Undertaking = quarterly,
  statements: readonly Statement[] = [june],
) =>
  statementLate(buildContext(buildInputs({ covenants: [], undertakings: [undertaking], statements }), asOf));

describe('quarterly accounts to 30 September, due 14 November, ten days of grace', () => {
  test.each([
    ['2026-11-14', null],
    ['2026-11-15', 'note'],
    ['2026-11-24', 'note'],
    ['2026-11-25', 'soon'],
  ] as const)('on %s are %s', (asOf, severity) => {
    expect(late(asOf)[0]?.severity ?? null).toBe(severity);
  });

  test('are told with their day and how late they are', () => {
    expect(late('2026-11-25')).toMatchObject([
      {
        factDate: '2026-09-30',
        sentence: 'Quarterly accounts to 30 Sep 2026 due 14 Nov 2026, 11 days late, past grace.',
      },
    ]);
    expect(late('2026-11-15')[0]?.sentence).toContain('1 day late.');
  });

  test('are there once flows of that period are there, not with a forecast', () => {
    const september = (given: Partial<Statement>) =>
      buildStatement('2026-09-30', 9, { revenue: 1 }, { receivedOn: '2026-11-20', ...given });
    expect(late('2026-11-25', quarterly, [june, september({})])).toEqual([]);
    expect(late('2026-11-25', quarterly, [june, september({ basis: 'forecast' })])).toHaveLength(1);
    expect(late('2026-11-19', quarterly, [june, september({})])).toHaveLength(1);
  });
});

test('a period that later accounts have overtaken is no longer chased', () => {
  expect(late('2026-11-10', quarterly, [])).toHaveLength(1);
  const september = buildStatement('2026-09-30', 9, { revenue: 1 }, { receivedOn: '2026-10-20' });
  expect(late('2026-11-10', quarterly, [september])).toEqual([]);
});

test('several late periods are one finding that speaks of the newest', () => {
  expect(late('2026-12-31', quarterly, [])).toMatchObject([
    { factDate: '2026-09-30', sentence: expect.stringContaining('2 periods are late.') as string },
  ]);
});

test('annual accounts are audited or reviewed; management figures of the day are not they', () => {
  const annual: Undertaking = {
    ...quarterly,
    kind: 'annual accounts',
    everyMonths: 12,
    firstPeriodEnd: '2025-12-31',
  };
  const management = buildStatement('2025-12-31', 12, { revenue: 1 });
  expect(late('2026-03-31', annual, [management])).toHaveLength(1);
  expect(late('2026-03-31', annual, [{ ...management, basis: 'reviewed' }])).toEqual([]);
});

test('business days are counted where the agreement counts them', () => {
  // 45 business days from Wednesday 30 September 2026 end on Wednesday 2 December.
  const business: Undertaking = { ...quarterly, dayCount: 'business', graceDays: 0 };
  expect(late('2026-12-02', business)).toEqual([]);
  expect(late('2026-12-03', business)).toHaveLength(1);
});
