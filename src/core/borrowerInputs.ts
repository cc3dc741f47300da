import type { PlainDate } from './calendar/plainDate.ts';
import type { Covenant } from './covenants/covenant.ts';
import type { CurrencyRate } from './measures/definition.ts';
import type { Statement } from './statements/statement.ts';

export const LEGAL_FORMS = [
  'company',
  'partnership',
  'sole trader',
  'natural person',
  'bank',
  'insurer',
  'property or project vehicle',
] as const;
export type LegalForm = (typeof LEGAL_FORMS)[number];

/** Never scored: methods.md B6 and the cautions of the trade. */
export const NEVER_SCORED: readonly LegalForm[] = [
  'sole trader',
  'natural person',
  'bank',
  'insurer',
  'property or project vehicle',
];

/** A set of figures that the agreement wants delivered. */
export interface Undertaking {
  readonly id: number;
  readonly kind: 'quarterly accounts' | 'annual accounts' | 'compliance certificate';
  readonly everyMonths: number;
  readonly dueDays: number;
  readonly dayCount: 'calendar' | 'business';
  readonly graceDays: number;
  readonly firstPeriodEnd: PlainDate;
}

/** Everything that one borrower's assessment rests on, as known at one moment. */
export interface BorrowerInputs {
  readonly borrowerId: number;
  readonly name: string;
  readonly legalForm: LegalForm;
  readonly sector: string;
  readonly currency: string;
  /** Month in which the financial year ends, 1 to 12. */
  readonly fiscalYearEndMonth: number;
  readonly inputVersion: number;
  /** Every version that is known; currentStatements() picks what is in force. */
  readonly statements: readonly Statement[];
  readonly covenants: readonly Covenant[];
  readonly undertakings: readonly Undertaking[];
  /** Currency rates that were recorded, with their sources. */
  readonly rates: readonly CurrencyRate[];
  /** What was said before the inputs last changed, for "fell since"; null before the first. */
  readonly previous: PreviousAssessment | null;
}

export interface PreviousAssessment {
  readonly quality: {
    readonly quarterEnd: PlainDate;
    readonly headline: number | null;
    readonly band: string | null;
  } | null;
}
