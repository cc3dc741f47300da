export type { InputUsed, MissingLine, Reading } from '../statements/reading.ts';

export const MEASURE_CODES = [
  'total-leverage',
  'net-leverage',
  'interest-cover',
  'current-ratio',
  'minimum-liquidity',
] as const;
export type MeasureCode = (typeof MEASURE_CODES)[number];

export type MeasureUnit = 'times' | 'money';
