/** THE WALK: statements, measures, covenant tests, reporting quality, patterns, alerts. */
import { allTests } from './allTests.ts';
import type { AlertFinding } from './alerts/alert.ts';
import { findingsOf } from './alerts/alertRules.ts';
import type { BookCrossSection } from './bookCrossSection.ts';
import type { BorrowerInputs } from './borrowerInputs.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import type { CovenantTest } from './covenants/covenantTest.ts';
import { smallestHeadroom, type SmallestHeadroom } from './covenants/smallestHeadroom.ts';
import { justPassingOf, type JustPassing } from './patterns/justPassing.ts';
import { METHOD_VERSION, type Policy } from './policy.ts';
import { reportingQuality } from './quality/reportingQuality.ts';
import type { ReportingQuality } from './quality/score.ts';
import { openBooks } from './statements/statementBook.ts';

export interface Assessment {
  readonly borrowerId: number;
  readonly asOf: PlainDate;
  readonly methodVersion: string;
  readonly policyVersion: number;
  /** Oldest first within a covenant. */
  readonly tests: readonly CovenantTest[];
  /** Against the levels of the test dates; later levels stand with each test, apart. */
  readonly smallestHeadroom: SmallestHeadroom | null;
  readonly quality: ReportingQuality;
  readonly patterns: readonly JustPassing[];
  readonly findings: readonly AlertFinding[];
}

/**
 * Everything that is said of one borrower on a day, from what was known by that day. The same arguments give the
 * same answer, for ever: the clock is `asOf`, the peers are the stored cross-section.
 *
 * @example assess(inputs, crossSection, POLICY_VERSION_1, '2026-11-30').methodVersion // => '1.0'
 */
export function assess(
  inputs: BorrowerInputs,
  crossSection: BookCrossSection,
  policy: Policy,
  asOf: PlainDate,
): Assessment {
  const books = openBooks(inputs, asOf);
  const tests = allTests(inputs, books, policy, asOf);
  const quality = reportingQuality(inputs, books, crossSection, policy, asOf);
  const covenantIds = inputs.covenants.map(({ id }) => id);
  const patterns = covenantIds.map((id) => justPassingOf(tests, id, policy.repeated.ofLast));
  return {
    borrowerId: inputs.borrowerId,
    asOf,
    methodVersion: METHOD_VERSION,
    policyVersion: policy.version,
    tests,
    smallestHeadroom: smallestHeadroom(tests, covenantIds),
    quality,
    patterns,
    findings: findingsOf({ inputs, tests, quality, patterns, policy, asOf }),
  };
}
