import { expect, test } from 'vitest';
import { spokenTest } from './spokenTest.ts';

const of = (...outcomes: Parameters<typeof spokenTest>[0][number]['outcome'][]) =>
  spokenTest(outcomes.map((outcome) => ({ outcome })))?.outcome;

test('a test that awaits figures is passed over, one without a ratio is not', () => {
  expect(of('met', 'awaiting figures')).toBe('met');
  expect(of('met', 'not met, ratio has no meaning')).toBe('not met, ratio has no meaning');
  expect(of('met', 'cannot be tested', 'awaiting figures')).toBe('cannot be tested');
  expect(of('awaiting figures')).toBe('awaiting figures');
  expect(of()).toBeUndefined();
});
