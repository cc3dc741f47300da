import fc from 'fast-check';
import { expect, test } from 'vitest';
import { risingTrend } from './trend.ts';

const group = fc.record({
  n: fc.integer({ min: 1, max: 30 }),
  share: fc.double({ min: 0, max: 1, noNaN: true }),
});

test('is the root of n times the squared correlation of score and answer over single persons', () => {
  fc.assert(
    fc.property(fc.array(group, { minLength: 2, maxLength: 5 }), (given) => {
      const groups = given.map(({ n, share }, score) => ({ n, yes: Math.round(n * share), score }));
      const persons = groups.flatMap(({ n, yes, score }) =>
        Array.from({ length: n }, (_, k) => [score, k < yes ? 1 : 0] as const),
      );
      const mean = (of: (person: readonly [number, number]) => number) =>
        persons.reduce((sum, person) => sum + of(person), 0) / persons.length;
      const [scores, answers] = [mean(([score]) => score), mean(([, answer]) => answer)];
      const covariance = mean(([score, answer]) => (score - scores) * (answer - answers));
      const spread = mean(([score]) => (score - scores) ** 2) * mean(([, answer]) => (answer - answers) ** 2);
      const trend = risingTrend(groups);
      if (spread < 1e-12) expect(trend).toEqual({ ok: false, error: { kind: 'no-spread' } });
      else
        expect(trend.ok && trend.value.statistic).toBeCloseTo(
          (covariance / Math.sqrt(spread)) * Math.sqrt(persons.length),
          8,
        );
    }),
  );
});

test('has no answer where nobody, or everybody, says yes', () => {
  const at = (yes: number) => risingTrend([0, 1, 2].map((score) => ({ n: 10, yes, score })));
  expect(at(0).ok).toBe(false);
  expect(at(10).ok).toBe(false);
  expect(at(5)).toMatchObject({ ok: true, value: { statistic: 0, pValue: 0.5 } });
});
