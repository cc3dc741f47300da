import fc from 'fast-check';
import { expect, test } from 'vitest';
import { bandAfter, bandOf, headlineOf } from './headline.ts';
import { QUALITY_BANDS } from './score.ts';

test('the headline is the mean of the last three quarter ends', () => {
  expect(headlineOf([90, 52, 41, 27])).toEqual({ headline: 40, quarters: 3, provisional: false });
});

test('two quarter ends are allowed, one is provisional, none gives no headline', () => {
  expect(headlineOf([null, 41, 27])).toEqual({ headline: 34, quarters: 2, provisional: false });
  expect(headlineOf([null, null, 27])).toEqual({ headline: 27, quarters: 1, provisional: true });
  expect(headlineOf([50, null, null, null])).toEqual({ headline: null, quarters: 0, provisional: false });
});

test.each([
  [65, 'well supported'],
  [64.999, 'broadly supported'],
  [45, 'broadly supported'],
  [44.999, 'needs explanation'],
  [30, 'needs explanation'],
  [29.999, 'weakly supported'],
  [0, 'weakly supported'],
])('%d lies in the band %s: a lower bound belongs to its band', (headline, band) => {
  expect(bandOf(headline)).toBe(band);
});

test.each([
  ['needs explanation', 29, 'needs explanation'],
  ['needs explanation', 25.001, 'needs explanation'],
  ['needs explanation', 25, 'weakly supported'],
  ['weakly supported', 34.999, 'weakly supported'],
  ['weakly supported', 35, 'needs explanation'],
  ['well supported', 61, 'well supported'],
  ['well supported', 60, 'broadly supported'],
  ['well supported', 39.9, 'needs explanation'],
  ['well supported', 0, 'weakly supported'],
  ['broadly supported', 70, 'well supported'],
  ['weakly supported', 100, 'well supported'],
] as const)('from %s a headline of %d gives %s: five points past a line', (previous, headline, band) => {
  expect(bandAfter(previous, headline)).toBe(band);
});

test('without a band before, the headline alone decides', () => {
  expect(bandAfter(null, 31)).toBe('needs explanation');
});

test('assessing twice with the same headline moves no band further', () => {
  fc.assert(
    fc.property(
      fc.constantFrom(...QUALITY_BANDS),
      fc.double({ min: 0, max: 100, noNaN: true }),
      (band, headline) => {
        const once = bandAfter(band, headline);
        expect(bandAfter(once, headline)).toBe(once);
      },
    ),
  );
});
