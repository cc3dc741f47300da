/** The published measures by name, and what is kept of each. */

export const PUBLISHED_MEASURES = [
  'sloan',
  'cash-flow-accruals',
  'percent-accruals',
  'total-accruals',
  'net-operating-assets',
  'jones',
  'modified-jones',
  'kothari',
  'dechow-dichev',
  'mcnichols',
  'm-score',
  'm-score-five',
  'f-score',
  'abnormal-cash-flow',
  'abnormal-production',
  'abnormal-discretionary',
  'real-activities',
  'smoothing-spread',
  'smoothing-correlation',
  'smoothing-size',
  'cash-conversion',
  'growth-neutral-conversion',
  'altman-private',
  'altman-any-trade',
  'ohlson',
  'zmijewski',
] as const;
export type PublishedMeasureKey = (typeof PUBLISHED_MEASURES)[number];

export interface PublishedMeasure {
  readonly key: PublishedMeasureKey;
  readonly value: number | null;
  readonly reason: string | null;
  /** What was filled or derived, and how many firms a model rests on. */
  readonly remarks: readonly string[];
}

/** A value with what has to be said beside it, or the reason why there is none. */
export type Given =
  { readonly value: number; readonly remarks?: readonly string[] } | { readonly missing: string };

export type Measures = Readonly<Partial<Record<PublishedMeasureKey, Given>>>;
