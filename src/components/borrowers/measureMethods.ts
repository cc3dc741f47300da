import type { MethodTopic } from '../../contracts/methodTopics.ts';
import type { MeasureCode } from '../../core/measures/measure.ts';

/** The page that says how a measure is computed. */
export const MEASURE_METHODS: Readonly<Record<MeasureCode, MethodTopic>> = {
  'total-leverage': 'leverage-measures',
  'senior-leverage': 'leverage-measures',
  'net-leverage': 'leverage-measures',
  'interest-cover': 'cover-measures',
  'debt-service-cover': 'cover-measures',
  'fixed-charge-cover': 'cover-measures',
  'loan-to-value': 'property-measures',
  'debt-yield': 'property-measures',
  'current-ratio': 'balance-measures',
  'quick-ratio': 'balance-measures',
  'tangible-net-worth': 'balance-measures',
  gearing: 'balance-measures',
  'minimum-liquidity': 'balance-measures',
  'minimum-ebitda': 'covenant-ebitda',
  'capital-expenditure': 'expenditure-limit',
};
