/** What lies ahead of one borrower, as its page shows it: every decimal as text. */
import type { Outcome } from '../core/covenants/covenantTest.ts';
import type { ProjectionRecord } from '../core/outlook/backTest.ts';
import type { ProjectedTest } from '../core/outlook/projection.ts';
import type { Factor, ScenarioName } from '../core/outlook/sensitivity.ts';

export type { ProjectionRecord } from '../core/outlook/backTest.ts';

export interface OutlookView {
  readonly projections: readonly ProjectionView[];
  /** Null in results that were stored before there was any. */
  readonly sensitivity: SensitivityView | null;
}

export interface ProjectionView {
  readonly covenantId: number;
  readonly fromTestDate: string | null;
  readonly reason: string | null;
  readonly tests: readonly ComingTestView[];
}

export type ComingTestView = { readonly testDate: string; readonly quarters: number } & (
  | (Omit<ProjectedTest, 'level'> & { readonly level: string })
  | { readonly kind: 'too few peers'; readonly level: string }
  | { readonly kind: 'nothing to project'; readonly reason: string }
);

export interface SensitivityView {
  /** Shares of one, decimal text. */
  readonly variableCostShare: string;
  readonly floatingDebtShare: string;
  readonly sizes: Readonly<Record<ScenarioName, ScenarioSizesView>>;
  readonly tests: readonly TestSensitivityView[];
  /** Which test is not met first as each factor moves, of those that are met; null where none is. */
  readonly first: Readonly<Record<Factor, FirstNotMetView | null>>;
  /** The equal fall at which no test is met any more. */
  readonly every: string | null;
}

export interface ScenarioSizesView {
  readonly salesFall: string;
  readonly workingCapitalLoss: string;
  readonly rateRise: string;
}

export interface FirstNotMetView {
  readonly covenantId: number;
  readonly share: string;
  readonly amount: string | null;
}

export interface TestSensitivityView {
  readonly covenantId: number;
  readonly testDate: string;
  readonly breakEvens: Readonly<Record<Factor, BreakEvenView>>;
  readonly scenarios: Readonly<Record<ScenarioName, ScenarioView>>;
}

export type BreakEvenView =
  | { readonly kind: 'at'; readonly share: string; readonly amount: string | null }
  | { readonly kind: 'not met already' | 'not reached' | 'never' }
  | { readonly kind: 'unknown'; readonly reason: string };

export type ScenarioView =
  | { readonly kind: 'computed'; readonly tested: string | null; readonly outcome: Outcome }
  | { readonly kind: 'unknown'; readonly reason: string };

/** What was said of past tests over the whole book, as of one night. */
export interface ProjectionRecordView {
  readonly asOf: string;
  readonly record: ProjectionRecord;
}
