export type { InputUsed, MissingLine, Reading } from '../statements/reading.ts';

export const MEASURE_CODES = [
  'total-leverage',
  'senior-leverage',
  'net-leverage',
  'interest-cover',
  'debt-service-cover',
  'fixed-charge-cover',
  'loan-to-value',
  'debt-yield',
  'current-ratio',
  'quick-ratio',
  'tangible-net-worth',
  'gearing',
  'minimum-liquidity',
  'minimum-ebitda',
  'capital-expenditure',
] as const;
export type MeasureCode = (typeof MEASURE_CODES)[number];

/** 'share' is a ratio that the trade writes in per cent: loan to value, debt yield. */
export type MeasureUnit = 'times' | 'share' | 'money';
