import { expect, test } from 'vitest';
import { projectionWord } from './projectionWord.ts';

test('unlikely below 10 %, possible from there, open from 33 %, likely above 66 %', () => {
  expect([0, 0.0999, 0.1, 0.3299, 0.33, 0.66, 0.6601, 1].map(projectionWord)).toEqual([
    'unlikely',
    'unlikely',
    'possible',
    'possible',
    'open',
    'open',
    'likely',
    'likely',
  ]);
});
