import { describe, expect, test } from 'vitest';
import { chanceByReversion, chanceFromOwnTests, chanceOfAnyNotMet } from './reversion.ts';

describe('the checks beside it', () => {
  const given = { headroom: 0.06, mean: 0.12, persistence: 0.75, deviation: 0.1, tightening: 0, quarters: 1 };

  test('gives the published chances by reversion', () => {
    // scipy.stats.norm: .128420 and, with a step of .05, .352728.
    expect(chanceByReversion(given)).toBeCloseTo(0.12842, 6);
    expect(chanceByReversion({ ...given, tightening: 0.05 })).toBeCloseTo(0.352728, 6);
  });

  test('forgets where it stands as the quarters go by', () => {
    const far = { ...given, quarters: 60 };
    expect(chanceByReversion(far)).toBeCloseTo(chanceByReversion({ ...far, headroom: -0.3 }), 6);
    // Two steps at once are two single steps: mean and variance by hand.
    const mean = 0.12 + 0.75 * (0.75 * (0.06 - 0.12));
    const variance = 0.01 * (1 - 0.75 ** 2) * (1 + 0.75 ** 2);
    const shifted = { ...given, headroom: mean, mean, persistence: 0, deviation: Math.sqrt(variance) };
    expect(chanceByReversion({ ...given, quarters: 2 })).toBeCloseTo(chanceByReversion(shifted), 12);
  });

  test('gives R’s chances of any test not met', () => {
    // R mvtnorm 1.1-3: .2792416 and .4869141.
    const three = [
      [0.04, 0.02, 0.01],
      [0.02, 0.09, 0.03],
      [0.01, 0.03, 0.16],
    ];
    expect(
      chanceOfAnyNotMet(
        [0.2, 0.3],
        [
          [0.04, 0.012],
          [0.012, 0.09],
        ],
      ),
    ).toBeCloseTo(0.2792416, 7);
    expect(chanceOfAnyNotMet([0.1, 0.25, 0.4], three)).toBeCloseTo(0.4869141, 6);
  });
});

describe('from the covenant’s own tests', () => {
  const asked = { bound: 'most', ratio: 3, level: 3.5, levelAhead: 3.5, quarters: 1 } as const;
  const headrooms = [0.1, 0.2, 0.1, 0.2, 0.1, 0.2, 0.1, 0.2];

  test('needs eight that moved', () => {
    expect(chanceFromOwnTests(headrooms.slice(1), asked)).toBeNull();
    expect(chanceFromOwnTests(headrooms, asked)).not.toBeNull();
    expect(chanceFromOwnTests(Array(8).fill(0.1), asked)).toBeNull();
  });

  test('takes mean and deviation of the last twelve, and a step as what it takes of headroom', () => {
    // By hand: mean .15, sample variance 8 x .05^2 / 7.
    const given = {
      mean: 0.15,
      deviation: Math.sqrt((8 * 0.0025) / 7),
      persistence: 0.75,
      headroom: 1 - 3 / 3.5,
      quarters: 2,
    };
    const old = Array.from({ length: 4 }, () => 0.15);
    expect(chanceFromOwnTests([9, ...headrooms.slice(0, 8)], asked)).not.toBeCloseTo(
      chanceFromOwnTests(headrooms, asked)!,
      3,
    );
    expect(chanceFromOwnTests([9, 9, ...old, ...headrooms], asked)).toBeCloseTo(
      chanceFromOwnTests([...old, ...headrooms], asked)!,
      12,
    );
    expect(chanceFromOwnTests(headrooms, { ...asked, levelAhead: 3.2, quarters: 2 })).toBeCloseTo(
      chanceByReversion({ ...given, tightening: 3 / 3.2 - 3 / 3.5 }),
      12,
    );
    const least = { bound: 'least', ratio: 2.4, level: 2, levelAhead: 2.2, quarters: 2 } as const;
    expect(chanceFromOwnTests(headrooms, least)).toBeCloseTo(
      chanceByReversion({ ...given, headroom: 2.4 / 2 - 1, tightening: 2.4 / 2 - 2.4 / 2.2 }),
      12,
    );
  });
});
