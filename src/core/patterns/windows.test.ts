import { expect, test } from 'vitest';
import { binsAround, edge } from './windows.ts';

test('bounds are the decimals that are written, not their binary products', () => {
  expect([3 * 0.1 === 0.3, edge(3, 0.1)]).toEqual([false, 0.3]);
  expect(edge(-2, 0.02, 0.06)).toBe(0.02);
});

test('bins are closed on their left: exactly at the level is met, exactly at the width is beyond', () => {
  const width = 0.02;
  const only = (headroom: number) => binsAround([headroom], width, 0);
  const none = { farLeft: 0, left: 0, right: 0, farRight: 0 };
  expect(only(0)).toEqual({ ...none, right: 1 });
  expect(only(-1e-12)).toEqual({ ...none, left: 1 });
  expect(only(0.02)).toEqual({ ...none, farRight: 1 });
  expect(only(0.02 - 1e-12)).toEqual({ ...none, right: 1 });
  expect(only(-0.04)).toEqual({ ...none, farLeft: 1 });
  expect(only(-0.04 - 1e-12)).toEqual(none);
  expect(only(0.04)).toEqual(none);
});
