import fc from 'fast-check';
import { expect, test } from 'vitest';
import { normalCdf, normalDensity } from '../statistics/normalDistribution.ts';
import { fitHeadrooms } from './headroomFit.ts';
import { headroomGrid, headroomSample, NEAR_LINE, nearProbabilities } from './headroomGrid.ts';
import { roomFor } from './headroomLikelihoods.ts';

const grid = headroomGrid(NEAR_LINE);
const headroom = fc.double({ min: -0.6, max: 0.9, noNaN: true });
const group = fc.array(fc.array(headroom, { minLength: 1, maxLength: 12 }), { minLength: 1, maxLength: 4 });

const fit = (series: readonly (readonly number[])[]) =>
  fitHeadrooms(
    grid,
    series.map((each) => headroomSample(each, NEAR_LINE)),
  );

test('the chances are those of the grid weighed value by value with the prior that is reported', () => {
  fc.assert(
    fc.property(group, (series) => {
      const { chances, prior } = fit(series);
      series.forEach((values, k) => {
        let [weights, passing, failing] = [0, 0, 0];
        grid.means.forEach((mean, m) =>
          grid.logSpreads.forEach((logSpread, s) => {
            const spread = Math.exp(logSpread);
            const inWindow = normalCdf((0.02 - mean) / spread) - normalCdf((-0.04 - mean) / spread);
            const likelihood = values.reduce((product, value) => {
              const isNear = value >= -0.04 && value < 0.02;
              return product * (isNear ? inWindow : normalDensity((value - mean) / spread) / spread) ** 0.5;
            }, 1);
            const weight =
              likelihood *
              normalDensity((mean - prior.mean) / prior.meanSpread) *
              normalDensity((logSpread - prior.logSpread) / prior.logSpreadSpread);
            const cell = m * grid.logSpreads.length + s;
            weights += weight;
            passing += weight * grid.passing[cell]!;
            failing += weight * grid.failing[cell]!;
          }),
        );
        expect(chances[k]!.passing).toBeCloseTo(passing / weights, 9);
        expect(chances[k]!.failing).toBeCloseTo(failing / weights, 9);
      });
    }),
    { numRuns: 15 },
  );
});

test('does not see where within the window the near tests lie', () => {
  // The medians, with which the prior starts, are the same for both: three values far above each near one.
  const lying = (near: number) =>
    Array.from({ length: 8 }, (_, k) => [near, near, 0.2 + k / 100, 0.25, 0.3, 0.31, 0.35]);
  const [failing, passing] = [-0.039, 0.019].map((near) =>
    fit(lying(near)).chances.map(({ passing: onSide, failing: off }) => onSide / (onSide + off)),
  );
  passing!.forEach((share, k) => expect(share).toBeCloseTo(failing![k]!, 3));
});

test('a group fitted without holding the likelihoods gives the same figures', () => {
  const samples = Array.from({ length: 30 }, (_, k) =>
    headroomSample([k / 50 - 0.1, k / 60, 0.01, 0.2], NEAR_LINE),
  );
  expect(fitHeadrooms(grid, samples, roomFor(grid, 1))).toEqual(fitHeadrooms(grid, samples));
});

test('a series far from its peers is weighed as exactly, though likelihood and prior hardly meet', () => {
  const peers = Array.from({ length: 2_000 }, (_, k) =>
    Array.from({ length: 60 }, (_, n) => 0.1 + (k % 3) / 1e3 + n / 1e4),
  );
  const far = Array.from({ length: 60 }, (_, n) => 0.75 + n / 1e4);
  const { chances, prior } = fit([far, ...peers]);
  const logWeights = [...grid.means].flatMap((mean) =>
    [...grid.logSpreads].map((logSpread) => {
      const squares = far.reduce((sum, value) => sum + ((value - mean) / Math.exp(logSpread)) ** 2, 0);
      return (
        -0.5 * (far.length * logSpread + squares / 2) -
        ((mean - prior.mean) / prior.meanSpread) ** 2 / 2 -
        ((logSpread - prior.logSpread) / prior.logSpreadSpread) ** 2 / 2
      );
    }),
  );
  const heaviest = Math.max(...logWeights);
  const weights = logWeights.map((logWeight) => Math.exp(logWeight - heaviest));
  const sum = weights.reduce((total, weight) => total + weight);
  const passing = weights.reduce((total, weight, cell) => total + weight * grid.passing[cell]!, 0) / sum;
  expect(chances[0]!.passing / passing).toBeCloseTo(1, 9);
});

test('the window is closed on its left and open on its right', () => {
  const counts = ({ passing, failing, outside }: ReturnType<typeof headroomSample>) => [
    failing,
    passing,
    outside,
  ];
  const at = (value: number) => counts(headroomSample([value], NEAR_LINE));
  expect([at(-0.04), at(-0.0400001), at(-1e-9), at(0), at(0.0199999), at(0.02)]).toEqual([
    [1, 0, 0],
    [0, 0, 1],
    [1, 0, 0],
    [0, 1, 0],
    [0, 1, 0],
    [0, 0, 1],
  ]);
});

test('small chances in the tail keep their digits', () => {
  // scipy 1.17.1: norm.cdf(-16) - norm.cdf(-17)
  const { passing } = nearProbabilities(-0.32, 0.02, { band: 0.02, gap: 0.04 });
  expect(passing / 6.388753989938285e-58).toBeCloseTo(1, 11);
});

test('refuses an empty group and an empty series', () => {
  expect(() => fitHeadrooms(grid, [])).toThrow(RangeError);
  expect(() => headroomSample([], NEAR_LINE)).toThrow(RangeError);
});
