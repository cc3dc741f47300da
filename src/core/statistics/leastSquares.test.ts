import fc from 'fast-check';
import { Matrix, QrDecomposition } from 'ml-matrix';
import { expect, test } from 'vitest';
import { leastSquares } from './leastSquares.ts';

const close = (got: readonly number[], certified: readonly number[], relative: number): void => {
  expect(got).toHaveLength(certified.length);
  certified.forEach((value, k) => {
    expect(Math.abs(got[k]! - value)).toBeLessThanOrEqual(relative * Math.max(1, Math.abs(value)));
  });
};

const fitted = (...args: Parameters<typeof leastSquares>) => {
  const fit = leastSquares(...args);
  if (!fit.ok) throw new Error(fit.error.kind);
  return fit.value;
};

test('needs one degree of freedom', () => {
  expect(leastSquares([1, 2], [[0, 1]], { constant: true })).toEqual({
    ok: false,
    error: { kind: 'too-few-points', needed: 3, given: 2 },
  });
  expect(leastSquares([1, 2, 4], [[0, 1, 2]], { constant: true }).ok).toBe(true);
});

test('refuses a column that is a combination of others, whatever its unit', () => {
  const first = [1, 4, 2, 8, 5, 7];
  for (const unit of [1e-9, 1, 1e9]) {
    const fit = leastSquares([3, 1, 4, 1, 5, 9], [first, first.map((value) => (3 * value - 2) * unit)], {
      constant: true,
    });
    expect(fit).toMatchObject({ ok: false, error: { kind: 'rank-deficient', rank: 2, columns: 3 } });
  }
});

test('refuses a column of zeros', () => {
  expect(leastSquares([1, 2, 3], [[0, 0, 0]], { constant: true })).toMatchObject({
    ok: false,
    error: { kind: 'rank-deficient', rank: 1 },
  });
});

test('has no R² where the response has no spread', () => {
  expect(fitted([2, 2, 2], [[1, 2, 4]], { constant: true }).rSquared).toBeNull();
});

test('agrees with the decomposition of ml-matrix, and leaves residuals that no column explains', () => {
  const value = fc.integer({ min: -1000, max: 1000 });
  const row = fc.tuple(value, value, value);
  fc.assert(
    fc.property(fc.array(row, { minLength: 8, maxLength: 30 }), (rows) => {
      const response = rows.map((each) => each[0]);
      const columns = [rows.map((each) => each[1]), rows.map((each) => each[2])];
      const fit = leastSquares(response, columns, { constant: true });
      fc.pre(fit.ok);
      if (!fit.ok) return;
      for (const column of columns) {
        const product = column.reduce((sum, each, k) => sum + each * fit.value.residuals[k]!, 0);
        expect(Math.abs(product)).toBeLessThan(1e-6);
      }
      const design = new Matrix(rows.map((each) => [1, each[1], each[2]]));
      const peer = new QrDecomposition(design);
      fc.pre(Math.min(...peer.upperTriangularMatrix.diagonal().map(Math.abs)) > 1e-3);
      close(fit.value.coefficients, peer.solve(Matrix.columnVector(response)).to1DArray(), 1e-6);
    }),
  );
});
