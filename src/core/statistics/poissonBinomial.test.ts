import fc from 'fast-check';
import { expect, test } from 'vitest';
import { poissonBinomial } from './poissonBinomial.ts';

test('agrees with adding up every outcome of every trial', () => {
  const chances = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 9 });
  fc.assert(
    fc.property(chances, (given) => {
      const sums = new Array<number>(given.length + 1).fill(0);
      for (let bits = 0; bits < 2 ** given.length; bits += 1) {
        const isYes = given.map((_, k) => (bits >> k) % 2 === 1);
        const probability = given.reduce(
          (product, chance, k) => product * (isYes[k] ? chance : 1 - chance),
          1,
        );
        sums[isYes.filter(Boolean).length]! += probability;
      }
      const { probabilities, mean, variance } = poissonBinomial(given);
      probabilities.forEach((probability, count) => expect(probability).toBeCloseTo(sums[count]!, 12));
      const first = probabilities.reduce((sum, probability, count) => sum + count * probability, 0);
      const second = probabilities.reduce((sum, probability, count) => sum + count * count * probability, 0);
      expect(mean).toBeCloseTo(first, 10);
      expect(variance).toBeCloseTo(second - first * first, 9);
    }),
    { numRuns: 60 },
  );
});
