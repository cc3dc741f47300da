/**
 * Fixed values of the methods that a method page prints beside those of the policy. Nobody changes them on a screen:
 * a new value is a new method version. Whoever writes a page adds the lines that it names.
 */
import { QUALITY_TABLE } from './quality/qualityTable.ts';

export interface MethodSetting {
  readonly label: string;
  /** As printed, with its unit. */
  readonly value: string;
}

const percent = (share: number): string => `${Number((share * 100).toPrecision(12))} %`;

export const METHOD_SETTINGS = {
  'quality.date': { label: 'Date of the table of weights', value: QUALITY_TABLE.date },
  'quality.weights': {
    label: 'Weights of the blocks',
    value: Object.entries(QUALITY_TABLE.weights)
      .map(([block, weight]) => `${block} ${weight}`)
      .join(', '),
  },
  'quality.fastGrowth': {
    label: 'Growth above which screens and noise are left out',
    value: percent(QUALITY_TABLE.fastGrowth),
  },
  'quality.fewestCoverage': {
    label: 'Fewest weights with figures for a score',
    value: `${QUALITY_TABLE.fewestCoverage} of 100`,
  },
  'quality.bands': {
    label: 'Bands, from',
    value: QUALITY_TABLE.bands.map(({ band, from }) => `${band} ${from}`).join(', '),
  },
  'quality.bandHysteresisPoints': {
    label: 'A band changes only when its line is passed by',
    value: `${QUALITY_TABLE.bandHysteresisPoints} points`,
  },
  'quality.headlineQuarters': {
    label: 'Quarter ends in the headline',
    value: String(QUALITY_TABLE.headlineQuarters),
  },
} as const satisfies Record<string, MethodSetting>;

export type MethodSettingKey = keyof typeof METHOD_SETTINGS;

export const METHOD_SETTING_KEYS = Object.keys(METHOD_SETTINGS) as readonly MethodSettingKey[];
