/** THE WALK: statements, measures, covenant tests, reporting quality, patterns, alerts. */
import type { AlertFinding } from './alerts/alert.ts';
import type { BorrowerInputs } from './borrowerInputs.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import type { CovenantTest } from './covenants/covenantTest.ts';
import type { JustPassing } from './patterns/justPassing.ts';
import type { Policy } from './policy.ts';
import type { CrossSection } from './quality/crossSection.ts';
import type { ReportingQuality } from './quality/score.ts';
import type { Decimal } from './money/decimal.ts';

export interface Assessment {
  readonly borrowerId: number;
  readonly asOf: PlainDate;
  readonly methodVersion: string;
  readonly policyVersion: number;
  /** Oldest first within a covenant. */
  readonly tests: readonly CovenantTest[];
  readonly smallestHeadroom: { readonly covenantId: number; readonly mayFall: Decimal } | null;
  readonly quality: ReportingQuality;
  readonly patterns: readonly JustPassing[];
  readonly findings: readonly AlertFinding[];
}

export declare function assess(
  inputs: BorrowerInputs,
  crossSection: CrossSection,
  policy: Policy,
  asOf: PlainDate,
): Assessment;
