import { expect, test } from 'vitest';
import {
  BOOK_SENTENCE,
  formatProbability,
  INNOCENT_REASONS,
  LEVERAGE_SENTENCE,
  LOW_POWER_SENTENCE,
  NO_PATTERN_SENTENCE,
  NOT_ENOUGH_NEAR,
  nearLineSentence,
} from './patternWording.ts';

test('says nothing below three tests near the line', () => {
  const at = (near: number) => nearLineSentence({ near, passing: near, expectedPassing: near / 3 });
  expect(at(2)).toBe(NOT_ENOUGH_NEAR);
  expect(at(3)).toBe(
    '3 of 3 tests that ended near the limit are on the passing side; about 1.0 would be expected',
  );
});

test('is never worded stronger than a pattern', () => {
  const sentence = nearLineSentence({ near: 6, passing: 6, expectedPassing: 2 });
  const texts = [
    ...[BOOK_SENTENCE, NO_PATTERN_SENTENCE, LEVERAGE_SENTENCE, LOW_POWER_SENTENCE, NOT_ENOUGH_NEAR],
    ...[INNOCENT_REASONS, sentence],
  ];
  for (const text of texts)
    expect(text).not.toMatch(
      /manipulat|fraud|misconduct|breach|deliberate|manage|lift|suspicio|evidence of/i,
    );
});

test.each([
  [0.0009999, 'below 0.001'],
  [0.001, '0.001'],
  [0.0999, '0.100'],
  [0.1, '0.10'],
  [1, '1.00'],
])('prints a probability of %s as %s', (value, text) => {
  expect(formatProbability(value)).toBe(text);
});
