import { SIGNIFICANCE, type BookPattern } from './bookPattern.ts';

/** The test that speaks for a part of the book. */
export interface LeadingTest {
  readonly test: 'standardized difference' | 'approximate sign test';
  /** One-sided; null where it could not be made. */
  readonly pValue: number | null;
  readonly rejects: boolean;
}

/**
 * From 1,000 tests on the standardized difference with the multinomial variance, below the approximate sign test.
 * Source: methods.md Part C 3.5.
 *
 * @example leadingTest({ hasLowPower: true, headline: { pRight: 0.01 }, signTest: { ok: true, value: { pAtLeast: 0.2 } } }) // => { test: 'approximate sign test', pValue: 0.2, rejects: false }
 */
export function leadingTest({
  hasLowPower,
  headline,
  signTest,
}: Pick<BookPattern, 'hasLowPower' | 'headline' | 'signTest'>): LeadingTest {
  const pValue = hasLowPower ? (signTest.ok ? signTest.value.pAtLeast : null) : headline.pRight;
  return {
    test: hasLowPower ? 'approximate sign test' : 'standardized difference',
    pValue,
    rejects: pValue !== null && pValue <= SIGNIFICANCE,
  };
}
