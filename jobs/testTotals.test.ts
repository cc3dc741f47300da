import { expect, test } from 'vitest';
import { lastLine, totalsOf } from './testTotals.mjs';

const counted = (passed: number, failed: number, skipped = 0, code = failed > 0 ? 1 : 0) => ({
  code,
  totals: { passed, failed, skipped },
});
const failures = (run: Partial<Parameters<typeof totalsOf>[0]>) =>
  totalsOf({ counted: counted(5, 0), failedChecks: 0, isCi: false, ...run }).failed;

test('the last line reads "N passed, N failed"', () => {
  const totals = totalsOf({ counted: counted(5, 2), failedChecks: 1, isCi: false });
  expect(lastLine(totals)).toBe('5 passed, 3 failed');
});

test('each failed check counts as one failed test', () => {
  expect(failures({})).toBe(0);
  expect(failures({ failedChecks: 2 })).toBe(2);
});

test('a skipped test counts as failed in CI and not elsewhere', () => {
  expect(failures({ counted: counted(5, 0, 3) })).toBe(0);
  expect(failures({ counted: counted(5, 0, 3), isCi: true })).toBe(3);
});

test('a run that cannot start, counts nothing, ran nothing or ends badly is a failure', () => {
  expect(failures({ counted: null })).toBe(1);
  expect(failures({ counted: { code: 1, totals: null } })).toBe(1);
  expect(failures({ counted: counted(0, 0) })).toBe(1);
  expect(failures({ counted: counted(5, 0, 0, 1) })).toBe(1);
});
