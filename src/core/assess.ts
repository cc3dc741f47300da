/** THE WALK: statements, measures, covenant tests, reporting quality, patterns, what may come, alerts. */
import { allTests } from './allTests.ts';
import type { AlertFinding } from './alerts/alert.ts';
import { findingsOf } from './alerts/alertRules.ts';
import type { BookCrossSection } from './bookCrossSection.ts';
import { besideTheScore } from './besideTheScore.ts';
import type { BorrowerInputs } from './borrowerInputs.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import type { CovenantTest } from './covenants/covenantTest.ts';
import {
  headroomCovenants,
  smallestHeadroom,
  smallestHeadroomsAhead,
  type SmallestHeadroom,
  type SmallestHeadroomAhead,
} from './covenants/smallestHeadroom.ts';
import { peersOfBook } from './outlook/peersOfBook.ts';
import { projections as projectionsOf, type Projection } from './outlook/projection.ts';
import { sensitivity, type Sensitivity } from './outlook/sensitivity.ts';
import { justPassingOf, type JustPassing } from './patterns/justPassing.ts';
import { nearLinesOf, type CovenantNearLine } from './patterns/nearLine.ts';
import { METHOD_VERSION, type Policy } from './policy.ts';
import { reportingQuality } from './quality/reportingQuality.ts';
import type { ReportingQuality } from './quality/score.ts';
import { openBooks } from './statements/statementBook.ts';
import { testsOnAccruals } from './testsOnAccruals.ts';

export interface Assessment {
  readonly borrowerId: number;
  readonly asOf: PlainDate;
  readonly methodVersion: string;
  readonly policyVersion: number;
  /** Oldest first within a covenant. */
  readonly tests: readonly CovenantTest[];
  /** Against the levels of the test dates; later levels stand with each test, apart. */
  readonly smallestHeadroom: SmallestHeadroom | null;
  /** The same at each step agreed for later, in order of days. */
  readonly headroomsAhead: readonly SmallestHeadroomAhead[];
  readonly quality: ReportingQuality;
  readonly patterns: readonly JustPassing[];
  /** Each covenant of an agreement, as of the last night; empty before the first. */
  readonly nearLine: readonly CovenantNearLine[];
  /** Each covenant's tests within four quarters of its latest one. */
  readonly projections: readonly Projection[];
  /** Null in results that were stored before there was any. */
  readonly sensitivity: Sensitivity | null;
  readonly findings: readonly AlertFinding[];
}

/**
 * Everything that is said of one borrower on a day, from what was known by that day. The same arguments give the
 * same answer, for ever: the clock is `asOf`, the peers are the stored cross-section.
 *
 * @example assess(inputs, crossSection, POLICY_VERSION_1, '2026-11-30').methodVersion // => '2.0'
 */
export function assess(
  inputs: BorrowerInputs,
  crossSection: BookCrossSection,
  policy: Policy,
  asOf: PlainDate,
): Assessment {
  const books = openBooks(inputs, asOf);
  const tested = allTests(inputs, books, policy, asOf);
  const scored = reportingQuality(inputs, books, crossSection, policy, asOf);
  const tests = testsOnAccruals(inputs, books, tested, scored);
  const counting = headroomCovenants(inputs.covenants);
  const covenantIds = inputs.covenants.map(({ id }) => id);
  const patterns = covenantIds.map((id) => justPassingOf(tests, id, policy.repeated.ofLast));
  const quarterEnd = scored.latest?.quarterEnd ?? null;
  const quality = {
    ...scored,
    beside: besideTheScore({ inputs, books, tests, patterns, quarterEnd, asOf }),
  };
  const nearLine = nearLinesOf(inputs.covenants, crossSection.patterns);
  const projections = projectionsOf(inputs, tests, peersOfBook(crossSection.ratios));
  return {
    borrowerId: inputs.borrowerId,
    asOf,
    methodVersion: METHOD_VERSION,
    policyVersion: policy.version,
    tests,
    smallestHeadroom: smallestHeadroom(tests, counting),
    headroomsAhead: smallestHeadroomsAhead(tests, counting),
    quality,
    patterns,
    nearLine,
    projections,
    sensitivity: sensitivity(inputs.covenants, tests, books, policy.outlook),
    findings: findingsOf({ inputs, tests, quality, patterns, nearLine, projections, policy, asOf }),
  };
}
