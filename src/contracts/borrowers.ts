import { z } from './zod.ts';
import type { LegalForm } from '../core/borrowerInputs.ts';
import type { Operator } from '../core/covenants/covenant.ts';
import type { CounterfactualKind, Outcome } from '../core/covenants/covenantTest.ts';
import type { BridgeLine } from '../core/measures/bridge.ts';
import type { MeasureCode, MeasureUnit } from '../core/measures/measure.ts';
import type { CovenantNearLine } from '../core/patterns/nearLine.ts';
import type { QualityBand, ReportingQuality } from '../core/quality/score.ts';
import type { AlertRow, StripTest } from './alerts.ts';
import type { MovementsView } from './movements.ts';
import type { OutlookView } from './outlook.ts';
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
  /** The same at the tightest step agreed for later. */
  readonly mayFallAhead: { readonly mayFall: string; readonly from: string } | null;
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
  readonly kind: BridgeLine['kind'];
  /** Reason, evidence and approver of an add-back, the cap, the source of a rate; null where nothing is to be said. */
  readonly note: string | null;
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
  /** Width of the just-passing band of the policy it was judged by, a share of the level; left out: version 1's. */
  readonly band?: string;
  readonly withoutAddBacks: string | null;
  /** The first test under a level agreed after signing. */
  readonly isFirstUnderReset: boolean;
}

/** Money put in, or that may be put in, for the latest test; amounts as decimal text, days as YYYY-MM-DD. */
export interface CureView {
  readonly curedBy: 'money' | 'money of an earlier quarter' | 'the next test' | null;
  readonly method: 'ebitda' | 'debt' | 'both' | null;
  readonly periodEnds: string | null;
  readonly needed: {
    readonly ebitda: string | null;
    readonly debt: string | null;
    readonly both: string | null;
  };
  readonly received: string | null;
  readonly receivedOn: string | null;
  readonly counted: string | null;
  readonly carried: string;
  readonly countsUntil: string | null;
  readonly ratioWith: string | null;
  readonly usedInFour: number;
  readonly mostInFour: number | null;
  readonly usedInLife: number;
  readonly mostInLife: number | null;
}

/** Drawings against the share above which a covenant is tested. */
export interface SpringingView {
  readonly drawn: string;
  readonly commitment: string;
  readonly utilisation: string | null;
  readonly trigger: string;
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
  /** The desk's own trigger, not in the agreement: marked so wherever it is shown. */
  readonly isOurs: boolean;
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
    readonly shareOfLevel: string | null;
    readonly moneyLeft: string | null;
    readonly otherSideMayRise: string | null;
  }[];
  /** Money room over the standard deviation of the last eight quarterly changes in EBITDA; null where not known. */
  readonly roomInDeviations: string | null;
  readonly springing: SpringingView | null;
  readonly waiver: {
    readonly grantedOn: string;
    readonly until: string | null;
    readonly conditions: string;
  } | null;
  readonly cure: CureView | null;
  readonly bridge: readonly BridgeRow[];
  /** The latest test by today's accounting, where the covenant goes by the rules at signing. */
  readonly otherAccounting: { readonly ratio: string | null; readonly outcome: Outcome } | null;
  readonly counterfactuals: readonly {
    readonly label: CounterfactualKind;
    readonly takenOut: string;
    readonly ratio: string | null;
    readonly outcome: Outcome;
    readonly breakEvenShare: string | null;
  }[];
  readonly sources: readonly SourceLink[];
  readonly missing: readonly string[];
  /** As of the last night; null before the first and for the desk's own triggers. */
  readonly nearLine: CovenantNearLine | null;
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
  /** Null before the first assessment. */
  readonly outlook: OutlookView | null;
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
