import { expect, test } from 'vitest';
import { JONES_MODELS, jonesModel, type JonesFirm } from './jones.ts';

/** Accruals that follow the model exactly but for the firm that carries more. */
const firms = Array.from({ length: 24 }, (_, k): JonesFirm => {
  const lagAssets = 40 + 3 * k;
  const revenueChange = ((k * 7) % 11) - 4;
  const ppeGross = 20 + ((k * 5) % 17);
  return {
    lagAssets,
    totalAccruals: -1.5 + 0.1 * revenueChange - 0.07 * ppeGross + (k === 5 ? 0.09 * lagAssets : 0),
    revenueChange,
    receivablesChange: 0.2 * revenueChange,
    ppeGross,
    priorReturnOnAssets: 0.02 + 0.001 * ((k * 13) % 9),
    cashFromOperations: 3 + ((k * 3) % 7),
  };
});

test.each(JONES_MODELS)('%s leaves the largest residual with the firm that carries more', (model) => {
  const fit = jonesModel(model, firms);
  if (!fit.ok) throw new Error(fit.error.kind);
  expect(fit.value.residuals).toHaveLength(24);
  expect(fit.value.residuals.indexOf(Math.max(...fit.value.residuals))).toBe(5);
});

test('the original has no constant and returns the coefficients that made the accruals', () => {
  const clean = firms.filter((_, k) => k !== 5);
  const fit = jonesModel('jones-1991', clean);
  if (!fit.ok) throw new Error(fit.error.kind);
  [-1.5, 0.1, -0.07].forEach((value, k) => expect(fit.value.coefficients[k]).toBeCloseTo(value, 10));
});

test('too few firms are an error, not a fit', () => {
  expect(jonesModel('kothari', firms.slice(0, 5))).toMatchObject({
    ok: false,
    error: { kind: 'too-few-points', needed: 6 },
  });
});
