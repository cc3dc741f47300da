import type { PlainDate } from '../calendar/plainDate.ts';

export const ALERT_KINDS = [
  'test not met',
  'thin headroom',
  'just passing, repeated',
  'pattern',
  'met only with add-backs',
  'met only on accruals',
  'past our trigger',
  'waiver, cure running out',
  'step-down ahead',
  'headroom shrinking',
  'reporting quality fell',
  'reporting quality weak',
  'prior figures restated',
  'statement late',
] as const;
export type AlertKind = (typeof ALERT_KINDS)[number];

export const SEVERITIES = ['urgent', 'soon', 'note'] as const;
export type Severity = (typeof SEVERITIES)[number];

/** The life of an alert; 'closed' and 'superseded' end it, every other state is open. */
export const ALERT_STATES = [
  'raised',
  'taken',
  'waiting for borrower',
  'waiting for analyst',
  'assessed',
  'put off',
  'carried into a proposal',
  'closing to be confirmed',
  'closed',
  'superseded',
] as const;
export type AlertState = (typeof ALERT_STATES)[number];

/** What the night found, before it is held against the alerts that are open. */
export interface AlertFinding {
  readonly kind: AlertKind;
  readonly covenantId: number | null;
  readonly severity: Severity;
  /** The test or quarter end that it speaks of; after closing, only a later one (or a higher severity) opens another. */
  readonly factDate: PlainDate;
  /** One plain sentence with the figures. */
  readonly sentence: string;
  /** What would change this, as a number. */
  readonly wouldChange: string;
  /** Facts behind the sentence, label and value, as printed. */
  readonly evidence: readonly { readonly label: string; readonly value: string }[];
}

/** Closing reasons, the closed list; a text is asked for besides. */
export const CLOSING_REASONS = [
  { code: 1, label: 'Data error corrected', secondPerson: false },
  { code: 2, label: 'Mapping or definition corrected', secondPerson: false },
  { code: 3, label: 'Timing or seasonality, evidence seen', secondPerson: false },
  { code: 4, label: 'One-off event, evidence seen', secondPerson: false },
  { code: 5, label: 'Acquisition, disposal or change of accounting policy', secondPerson: false },
  { code: 6, label: 'Covenant reset or waiver already decided', secondPerson: false },
  { code: 7, label: 'Known and already covered by a watchlist entry', secondPerson: false },
  { code: 8, label: 'Borrower explanation accepted, evidence attached', secondPerson: true },
  { code: 9, label: 'Risk accepted within authority', secondPerson: true },
  { code: 10, label: 'Exposure repaid or cancelled', secondPerson: false },
  { code: 11, label: 'Duplicate or merged', secondPerson: false },
  { code: 12, label: 'Rule unsuitable for this type of borrower', secondPerson: false },
] as const;
