import { sumOfReadings, type Reading } from '../statements/reading.ts';

/**
 * A paid item as the formulas write it: what goes out is stored below nought and counts as positive.
 *
 * @example turned({ kind: 'value', value: decimal(-3), inputs: [] }).value // => 3
 */
export const turned = (paid: Reading): Reading => sumOfReadings([{ sign: -1, reading: paid }]);
