import type { BorrowerInputs } from '../borrowerInputs.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { latestLiveTest } from '../covenants/latestLiveTest.ts';
import type { JustPassing } from '../patterns/justPassing.ts';
import type { Projection } from '../outlook/projection.ts';
import type { CovenantNearLine } from '../patterns/nearLine.ts';
import type { Policy } from '../policy.ts';
import type { ReportingQuality } from '../quality/score.ts';
import type { AlertFinding, Severity } from './alert.ts';

/** What every rule may look at. */
export interface AlertContext {
  readonly inputs: BorrowerInputs;
  /** Oldest first within a covenant. */
  readonly tests: readonly CovenantTest[];
  readonly quality: ReportingQuality;
  readonly patterns: readonly JustPassing[];
  /** As of the last night; empty before the first. */
  readonly nearLine: readonly CovenantNearLine[];
  /** Each covenant's coming tests, by the changes of last night's peers. */
  readonly projections: readonly Projection[];
  readonly policy: Policy;
  readonly asOf: PlainDate;
}

/** One kind of alert: what of it is found, or nothing. */
export type AlertRule = (context: AlertContext) => readonly AlertFinding[];

/**
 * Each covenant with its latest live test, where it has one.
 *
 * @example liveTests(nightOf({ ebitda: 12, debt: 45, cash: 6 })).map(({ test }) => test.outcome) // => ['met, thin']
 */
export const liveTests = ({
  inputs,
  tests,
}: AlertContext): readonly { readonly covenant: Covenant; readonly test: CovenantTest }[] =>
  inputs.covenants.flatMap((covenant) => {
    const test = latestLiveTest(tests, covenant.id);
    return test ? [{ covenant, test }] : [];
  });

/**
 * How serious a finding on a covenant is: one step less where it is the desk's own trigger, which is no promise of the
 * borrower.
 *
 * @example severityOn({ isOurs: true }, 'soon') // => 'note'
 */
export function severityOn({ isOurs }: Pick<Covenant, 'isOurs'>, severity: Severity): Severity {
  if (!isOurs) return severity;
  return severity === 'urgent' ? 'soon' : 'note';
}
