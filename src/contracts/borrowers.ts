import { z } from './zod.ts';
import type { LegalForm } from '../core/borrowerInputs.ts';
import type { Operator } from '../core/covenants/covenant.ts';
import type { Outcome } from '../core/covenants/covenantTest.ts';
import type { MeasureCode, MeasureUnit } from '../core/measures/measure.ts';
import type { QualityBand, ReportingQuality } from '../core/quality/score.ts';
import type { AlertRow, StripTest } from './alerts.ts';
import type { MovementsView } from './movements.ts';
import { pageQuery } from './paging.ts';
import type { ProposalRow, WatchlistRow } from './watchlist.ts';

export const BORROWER_SORTS = ['name', 'may-fall', 'quality', 'drawn', 'alerts'] as const;

export const borrowerQuery = pageQuery.extend({
  search: z.string().trim().max(100).optional(),
  sector: z.string().max(16).optional(),
  deskId: z.coerce.number().int().positive().optional(),
  sort: z.enum(BORROWER_SORTS).default('may-fall'),
  direction: z.enum(['up', 'down']).default('up'),
});
export type BorrowerQuery = z.infer<typeof borrowerQuery>;

export interface BorrowerRow {
  readonly id: number;
  readonly name: string;
  readonly deskName: string;
  readonly sectorLabel: string;
  readonly currency: string;
  /** Sum over the facilities in the borrower's currency, decimal text. */
  readonly limit: string;
  readonly drawn: string;
  readonly managerName: string;
  readonly covenantName: string | null;
  readonly strip: readonly StripTest[];
  readonly mayFall: string | null;
  readonly latestOutcome: Outcome | null;
  readonly qualityHeadline: number | null;
  readonly qualityBand: QualityBand | null;
  readonly openAlerts: number;
  readonly urgentAlerts: number;
  readonly watchGrade: string | null;
  readonly latestFigures: string | null;
}

/** What the page says of when and with what the figures were computed. */
export interface ComputedFacts {
  readonly asOf: string;
  readonly dataCutOff: string;
  readonly peersAsOf: string | null;
  /** Figures were accepted by day: the peers are last night's. */
  readonly peersAreLastNights: boolean;
  readonly methodVersion: string;
  readonly policyVersion: number;
  readonly inputVersion: number;
}

export interface SourceLink {
  readonly statementId: number;
  readonly line: string;
  readonly label: string;
  readonly amount: string;
  readonly sign: 1 | -1;
  readonly periodEnd: string;
  readonly months: number;
}

export interface BridgeRow {
  readonly label: string;
  readonly amount: string;
  readonly kind: 'figure' | 'subtotal' | 'add-back' | 'disallowed';
  readonly sources: readonly SourceLink[];
}

/** One test, every number as decimal text or null where there is none. */
export interface TestView {
  readonly testDate: string;
  readonly level: string | null;
  readonly tested: string | null;
  readonly numerator: string | null;
  readonly denominator: string | null;
  readonly outcome: Outcome;
  readonly underlyingOutcome: Outcome;
  readonly reason: string | null;
  readonly mayFall: string | null;
  readonly shareOfLevel: string | null;
  readonly justPassing: boolean;
  readonly withoutAddBacks: string | null;
}

export interface CovenantView {
  readonly id: number;
  readonly name: string;
  readonly clause: string;
  readonly facilityName: string;
  readonly measure: MeasureCode;
  readonly unit: MeasureUnit;
  readonly currency: string;
  readonly operator: Operator;
  readonly roundingPlaces: number | null;
  /** Oldest first; the last one is the latest test. */
  readonly tests: readonly TestView[];
  readonly fallOf: 'earnings' | 'tested amount';
  /** "EBITDA may fall 0.4m" */
  readonly whatIsLeft: string;
  readonly headroom: {
    readonly absolute: string | null;
    readonly shareOfLevel: string | null;
    readonly mayFall: string | null;
    readonly moneyLeft: string | null;
    readonly otherSideMayRise: string | null;
    readonly otherSideShare: string | null;
  } | null;
  readonly laterLevels: readonly {
    readonly from: string;
    readonly level: string;
    readonly outcome: Outcome;
    readonly mayFall: string | null;
  }[];
  readonly bridge: readonly BridgeRow[];
  readonly counterfactuals: readonly {
    readonly label: string;
    readonly takenOut: string;
    readonly ratio: string | null;
    readonly outcome: Outcome;
    readonly breakEvenShare: string | null;
  }[];
  readonly sources: readonly SourceLink[];
  readonly missing: readonly string[];
  readonly pattern: { readonly inBand: number; readonly ofLast: number; readonly run: number } | null;
  /** Of the latest test: 'preliminary', 'checked', 'disputed'; and what the borrower certified, where it did. */
  readonly checking: string;
  readonly certified: string | null;
}

export interface FacilityView {
  readonly id: number;
  readonly name: string;
  readonly kind: string;
  readonly currency: string;
  readonly limit: string;
  readonly drawn: string;
  readonly marginBps: number | null;
  readonly maturesOn: string;
  readonly security: string;
}

export interface BorrowerView {
  readonly id: number;
  readonly name: string;
  readonly legalForm: LegalForm;
  readonly lei: string | null;
  readonly isListed: boolean;
  readonly sectorCode: string;
  readonly sectorLabel: string;
  readonly country: string;
  readonly currency: string;
  readonly fiscalYearEndMonth: number;
  readonly deskId: number;
  readonly deskName: string;
  readonly managerId: number;
  readonly managerName: string;
  readonly analystName: string;
  readonly facilities: readonly FacilityView[];
  /** Null before the first assessment. */
  readonly computed: ComputedFacts | null;
  readonly covenants: readonly CovenantView[];
  readonly quality: ReportingQuality | null;
  /** Null before there was an earlier night to hold the result against. */
  readonly movements: MovementsView | null;
  /** The lender's day, against which due dates stand. */
  readonly today: string;
  readonly alerts: readonly AlertRow[];
  readonly watchlist: WatchlistRow | null;
  readonly proposals: readonly ProposalRow[];
  readonly mayImport: boolean;
  readonly mayPropose: boolean;
  readonly deskMembers: readonly { readonly id: number; readonly name: string }[];
}

/** One version of one period, its amounts by line as decimal text; a line that is not there is missing. */
export interface StatementView {
  readonly id: number;
  readonly periodStart: string;
  readonly periodEnd: string;
  readonly months: number;
  readonly basis: string;
  readonly scope: string;
  readonly currency: string;
  readonly tie: string;
  readonly version: number;
  /** False where a later version of the same period, basis and scope is in force. */
  readonly inForce: boolean;
  readonly receivedOn: string;
  readonly importId: number | null;
  readonly fileName: string | null;
  readonly amounts: Readonly<Record<string, string>>;
}

/** Where one amount came from; its import page shows the cell. */
export interface SourceCellView {
  readonly importId: number | null;
  readonly fileName: string | null;
  readonly sha256: string | null;
  readonly sheet: string;
  readonly cell: string;
  readonly rawText: string;
  readonly label: string;
  readonly fromFormula: boolean;
}
