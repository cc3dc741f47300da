/** Counts the finished tests themselves, and what broke outside of any, into the file that jobs/test.mjs reads. */
import { writeFileSync } from 'node:fs';
import type { Reporter, SerializedError, TestModule } from 'vitest/node';

export default class CountReporter implements Reporter {
  onTestRunEnd(modules: readonly TestModule[], errors: readonly SerializedError[]): void {
    const path = process.env['TEST_TOTALS'];
    if (path) writeFileSync(path, JSON.stringify(countTests(modules, errors)));
  }
}

export interface Totals {
  readonly passed: number;
  readonly failed: number;
  readonly skipped: number;
}

/** A file that broke in its import or a hook, and an error nobody caught, each count as one failed test. */
export function countTests(
  modules: readonly Pick<TestModule, 'children' | 'errors'>[],
  errors: readonly unknown[],
): Totals {
  const states = modules.flatMap((module) =>
    [...module.children.allTests()].map((test) => test.result().state),
  );
  const count = (state: string): number => states.filter((one) => one === state).length;
  const broken = modules.filter((module) => module.errors().length > 0).length;
  const [passed, failed] = [count('passed'), count('failed')];
  return {
    passed,
    failed: failed + broken + errors.length,
    skipped: states.length - passed - failed,
  };
}
