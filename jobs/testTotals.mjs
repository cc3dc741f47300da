/** The totals of a test run, so that nothing that went wrong can end in "0 failed". */

/**
 * @param {{ counted: null | { code: number, totals: null | { passed: number, failed: number, skipped: number } },
 *   failedChecks: number, isCi: boolean }} run `counted` is null where the tests could not be started
 * @returns {{ passed: number, failed: number, skipped: number }}
 */
export function totalsOf({ counted, failedChecks, isCi }) {
  const { passed, failed, skipped } = counted?.totals ?? { passed: 0, failed: 1, skipped: 0 };
  const notRun = isCi ? skipped : 0;
  const all = failed + notRun + failedChecks;
  // A run that ends badly without a failed test, or that ran no test, is a failure that nobody counted.
  const isUncounted = all === 0 && (counted?.code !== 0 || passed === 0);
  return { passed, failed: all + (isUncounted ? 1 : 0), skipped };
}

export const lastLine = ({ passed, failed }) => `${passed} passed, ${failed} failed`;
