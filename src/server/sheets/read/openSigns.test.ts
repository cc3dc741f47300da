import { afterAll, expect, test } from 'vitest';
import type { Typed } from '../../../../tests/support/gridWorkbook.ts';
import { figures, kinds, read } from './messyFiles.fixture.ts';
import { readingPool } from './readWorkbook.ts';

afterAll(() => readingPool().close());

const RESULT = 'ebit 2026-09-30 3';

test('a loss without a minus is negative where a total proves it, else asked about once for all losses', async () => {
  const proven: Typed[][] = [
    ['EUR thousand', 'Q3 2026'],
    ['Revenue', 1000],
    ['Cost of sales', 700],
    ['Administrative expenses', 420],
    ['Operating loss', 120],
  ];
  expect(figures(await read({ PnL: proven }))[RESULT]).toBe('-120000');
  const open: Typed[][] = [
    ['EUR thousand', 'Q3 2026'],
    ['Revenue', 1000],
    ['Operating loss', 120],
    ['Loss before tax', 150],
  ];
  const asked = await read({ PnL: open });
  expect(kinds(asked)).toEqual(['sign']);
  const key = asked.questions[0]?.key ?? '';
  expect(figures(await read({ PnL: open }, { answers: { [key]: 'negative' } }))[RESULT]).toBe('-120000');
});

test('cash that is used, without a minus and without a proof, is asked about', async () => {
  const flow: Typed[][] = [
    ['EUR thousand', 'Q3 2026'],
    ['Net cash from operating activities', 260],
    ['Net cash used in investing activities', 90],
    ['Net cash used in financing activities', 50],
  ];
  const asked = await read({ 'Cash flow': flow });
  expect(kinds(asked)).toEqual(['sign']);
  expect(asked.facts.filter(({ waitsFor }) => waitsFor.length === 0).map(({ code }) => code)).toEqual([
    'cfo',
  ]);
  const proven = [...flow, ['Opening cash', 100], ['Net change in cash', 120]] as Typed[][];
  proven.splice(4, 1);
  const read_ = await read({ 'Cash flow': proven });
  expect(figures(read_)).toMatchObject({ 'cfi 2026-09-30 3': '-90000', 'cff 2026-09-30 3': '-50000' });
});

test('an exceptional figure that no total proves is asked about, and a gain by its words is not', async () => {
  const rows: Typed[][] = [
    ['EUR thousand', 'Q3 2026'],
    ['Revenue', 2000],
    ['Exceptional items', 50],
  ];
  expect(kinds(await read({ PnL: rows }))).toEqual(['sign']);
  rows[2] = ['Gain on disposal', 50];
  expect(kinds(await read({ PnL: rows }))).toEqual([]);
});

test('what may be more of a line holds that line back until it is placed', async () => {
  const reading = await read({
    PnL: [
      ['EUR thousand', 'Q3 2026'],
      ['Revenue', 1200],
      ['Revenue from South', 800],
      ['Cost of sales', 1200],
      ['Gross profit', 800],
    ],
  });
  expect(kinds(reading)).toEqual(['placement']);
  expect(reading.facts.filter(({ waitsFor }) => waitsFor.length > 0).map(({ code }) => code)).toEqual([
    'revenue',
  ]);
});

test('overheads of many small rows are read as their total', async () => {
  const reading = await read({
    PnL: [
      ['EUR thousand', 'Q3 2026', 'Q3 2025'],
      ['Revenue', 2000, 1900],
      ['Cost of sales', 1200, 1140],
      ['Gross profit', 800, 760],
      ['Motor and travel', 120, 110],
      ['Telephone', 80, 75],
      ['Insurance', 100, 95],
      ['Total overheads', 300, 280],
      ['Operating profit', 500, 480],
    ],
  });
  expect(kinds(reading)).toEqual([]);
  expect(figures(reading)).toMatchObject({ 'sga 2026-09-30 3': '300000', 'sga 2025-09-30 3': '280000' });
});
