/**
 * Every value of the policy that two persons may change: its name, its unit, how far it may go. Whoever adds a value
 * to `Policy` adds its line here; the form, the comparison of versions and the method pages follow from it.
 */
import { decimal, type Decimal } from './money/decimal.ts';
import { formatShare } from './money/print.ts';
import type { Policy } from './policy.ts';

/** A share of one, or a whole number of something. */
export type SettingUnit = 'share' | 'tests' | 'days' | 'points';

export interface PolicySetting {
  /** As the sentence "…: 2.0 %" names it. */
  readonly label: string;
  /** Settings of one rule stand together. */
  readonly rule: string;
  readonly unit: SettingUnit;
  /** Inclusive bounds, in the unit. */
  readonly least: Decimal;
  readonly most: Decimal;
  readonly read: (policy: Policy) => Decimal;
  readonly change: (policy: Policy, value: Decimal) => Policy;
}

const bounds = (least: string | number, most: string | number) => ({
  least: decimal(least),
  most: decimal(most),
});

export const POLICY_SETTINGS = {
  justPassingBand: {
    label: 'Just passing: on the passing side, within this share of the level',
    rule: 'Just passing',
    unit: 'share',
    ...bounds('0.001', '0.10'),
    read: (policy) => policy.justPassingBand,
    change: (policy, value) => ({ ...policy, justPassingBand: value }),
  },
  thinBelow: {
    label: 'Thin headroom: earnings may fall by less than',
    rule: 'Thin headroom',
    unit: 'share',
    ...bounds('0.01', '0.50'),
    read: (policy) => policy.thinBelow,
    change: (policy, value) => ({ ...policy, thinBelow: value }),
  },
  'repeated.atLeast': {
    label: 'Just passing, repeated: at least so many tests in the band',
    rule: 'Just passing, repeated',
    unit: 'tests',
    ...bounds(2, 12),
    read: ({ repeated }) => decimal(repeated.atLeast),
    change: (policy, value) => ({
      ...policy,
      repeated: { ...policy.repeated, atLeast: value.toNumber() },
    }),
  },
  'repeated.ofLast': {
    label: 'Just passing, repeated: of the last so many tests',
    rule: 'Just passing, repeated',
    unit: 'tests',
    ...bounds(2, 12),
    read: ({ repeated }) => decimal(repeated.ofLast),
    change: (policy, value) => ({ ...policy, repeated: { ...policy.repeated, ofLast: value.toNumber() } }),
  },
  'repeated.weakBelow': {
    label: 'Just passing, repeated: soon instead of note where quality is below',
    rule: 'Just passing, repeated',
    unit: 'points',
    ...bounds(0, 100),
    read: ({ repeated }) => decimal(repeated.weakBelow),
    change: (policy, value) => ({
      ...policy,
      repeated: { ...policy.repeated, weakBelow: value.toNumber() },
    }),
  },
  'stepDown.soonDays': {
    label: 'Step-down ahead: soon within',
    rule: 'Step-down ahead',
    unit: 'days',
    ...bounds(1, 730),
    read: ({ stepDown }) => decimal(stepDown.soonDays),
    change: (policy, value) => ({ ...policy, stepDown: { ...policy.stepDown, soonDays: value.toNumber() } }),
  },
  'stepDown.noteDays': {
    label: 'Step-down ahead: note within',
    rule: 'Step-down ahead',
    unit: 'days',
    ...bounds(1, 730),
    read: ({ stepDown }) => decimal(stepDown.noteDays),
    change: (policy, value) => ({ ...policy, stepDown: { ...policy.stepDown, noteDays: value.toNumber() } }),
  },
  restatedBy: {
    label: 'Prior figures restated: twelve months’ EBITDA moved by more than',
    rule: 'Prior figures restated',
    unit: 'share',
    ...bounds('0.001', '0.50'),
    read: (policy) => policy.restatedBy,
    change: (policy, value) => ({ ...policy, restatedBy: value }),
  },
  'qualityFell.points': {
    label: 'Reporting quality fell: a lower band and at least',
    rule: 'Reporting quality',
    unit: 'points',
    ...bounds(1, 100),
    read: ({ qualityFell }) => decimal(qualityFell.points),
    change: (policy, value) => ({
      ...policy,
      qualityFell: { ...policy.qualityFell, points: value.toNumber() },
    }),
  },
  qualityWeakBelow: {
    label: 'Reporting quality weak: below',
    rule: 'Reporting quality',
    unit: 'points',
    ...bounds(0, 100),
    read: (policy) => decimal(policy.qualityWeakBelow),
    change: (policy, value) => ({ ...policy, qualityWeakBelow: value.toNumber() }),
  },
} as const satisfies Record<string, PolicySetting>;

export type PolicyKey = keyof typeof POLICY_SETTINGS;

export const POLICY_KEYS = Object.keys(POLICY_SETTINGS) as readonly PolicyKey[];

/**
 * One setting of the register, as its common shape.
 *
 * @example policySetting('thinBelow').unit // => 'share'
 */
export const policySetting = (key: PolicyKey): PolicySetting => POLICY_SETTINGS[key];

/**
 * A setting's value as printed, with its unit.
 *
 * @example printSetting('thinBelow', decimal('0.1')) // => '10.0\u00a0%'
 * @example printSetting('stepDown.soonDays', decimal(90)) // => '90 days'
 */
export function printSetting(key: PolicyKey, value: Decimal): string {
  const { unit } = policySetting(key);
  return unit === 'share'
    ? formatShare(value, { places: Math.max(1, value.times(100).dp()) })
    : `${value.toFixed()} ${unit}`;
}
