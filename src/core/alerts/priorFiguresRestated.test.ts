import { expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { buildCovenant, buildLevel, buildYear } from '../covenants/covenant.fixture.ts';
import { priorFiguresRestated } from './priorFiguresRestated.ts';
import { buildContext, buildInputs } from './rule.fixture.ts';

const on: PlainDate = '2025-12-31';
const covenant = (level: string) =>
  buildCovenant({ firstTestOn: on, everyMonths: 12, levels: [buildLevel('2025-01-01', null, level)] });

function restated(ebitda: number, level: string, asOf: PlainDate = '2026-06-30') {
  const statements = [
    ...buildYear(on, { ebitda: 10, debt: 30, cash: 0 }, { receivedOn: '2026-02-10' }),
    ...buildYear(on, { ebitda, debt: 30, cash: 0 }, { receivedOn: '2026-05-20', version: 2 }),
  ];
  return priorFiguresRestated(buildContext(buildInputs({ covenants: [covenant(level)], statements }), asOf));
}

test.each([
  ['9.8', 9.8, 0],
  ['9.79', 9.79, 1],
  ['10.2', 10.2, 0],
  ['10.21', 10.21, 1],
])('EBITDA of 10 restated to %s: 2 %% is not news, more is', (_, ebitda, count) => {
  expect(restated(ebitda, '5')).toHaveLength(count);
});

test('says both figures and the day it came', () => {
  expect(restated(9, '5')).toMatchObject([
    {
      kind: 'prior figures restated',
      severity: 'soon',
      covenantId: null,
      factDate: '2026-05-20',
      sentence: 'EBITDA of twelve months to 31 Dec 2025 restated from 10 to 9 (−10.0\u00a0%).',
    },
  ]);
});

test('a past outcome that changes is news whatever the share', () => {
  expect(restated(9.9, '3.02')).toMatchObject([
    { sentence: 'Prior figures restated; one past outcome changes.' },
  ]);
  expect(restated(9, '3.02')).toMatchObject([
    { sentence: expect.stringContaining('(−10.0\u00a0%); one past outcome changes.') as string },
  ]);
});

test('is not there before the day, and is news for two quarters', () => {
  expect(restated(9, '5', '2026-05-19')).toEqual([]);
  expect(restated(9, '5', '2026-05-20')).toHaveLength(1);
  expect(restated(9, '5', '2026-11-19')).toHaveLength(1);
  expect(restated(9, '5', '2026-11-20')).toEqual([]);
});

test('figures of a new period are no restatement', () => {
  const statements = [
    ...buildYear('2024-12-31', { ebitda: 10, debt: 30, cash: 0 }),
    ...buildYear(on, { ebitda: 5, debt: 30, cash: 0 }),
  ];
  const context = buildContext(buildInputs({ covenants: [covenant('5')], statements }), '2026-06-30');
  expect(priorFiguresRestated(context)).toEqual([]);
});
