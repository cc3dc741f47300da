/**
 * Every value of the policy that two persons may change: its name, its unit, how far it may go. Whoever adds a value
 * to `Policy` adds its line here; the form, the comparison of versions and the method pages follow from it.
 */
import { decimal, type Decimal } from './money/decimal.ts';
import { formatShareLevel } from './money/print.ts';
import type { OutlookPolicy, Policy, ScenarioSizes } from './policy.ts';

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

const outlookShare = (label: string, key: 'variableCostShare' | 'floatingDebtShare') =>
  ({
    label,
    rule: 'Sensitivity',
    unit: 'share',
    ...bounds(0, 1),
    read: ({ outlook }: Policy) => outlook[key],
    change: (policy: Policy, value: Decimal): Policy => ({
      ...policy,
      outlook: { ...policy.outlook, [key]: value },
    }),
  }) as const;

const SCENARIO_LABELS = {
  salesFall: 'sales fall by',
  workingCapitalLoss: 'of receivables and stocks no cash comes in from',
  rateRise: 'interest on floating debt rises, of the debt a year, by',
} as const satisfies Record<keyof ScenarioSizes, string>;

const scenarioShare = (
  name: string,
  scenario: Extract<keyof OutlookPolicy, 'slowerSales' | 'dearerMoney'>,
  key: keyof ScenarioSizes,
) =>
  ({
    label: `${name}: ${SCENARIO_LABELS[key]}`,
    rule: 'Scenarios',
    unit: 'share',
    ...bounds(0, '0.50'),
    read: ({ outlook }: Policy) => outlook[scenario][key],
    change: (policy: Policy, value: Decimal): Policy => ({
      ...policy,
      outlook: { ...policy.outlook, [scenario]: { ...policy.outlook[scenario], [key]: value } },
    }),
  }) as const;

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
  'runningOut.soonDays': {
    label: 'Waiver, cure running out: soon within',
    rule: 'Waiver, cure running out',
    unit: 'days',
    ...bounds(1, 365),
    read: ({ runningOut }) => decimal(runningOut.soonDays),
    change: (policy, value) => ({
      ...policy,
      runningOut: { ...policy.runningOut, soonDays: value.toNumber() },
    }),
  },
  'runningOut.urgentDays': {
    label: 'Waiver, cure running out: urgent within',
    rule: 'Waiver, cure running out',
    unit: 'days',
    ...bounds(1, 365),
    read: ({ runningOut }) => decimal(runningOut.urgentDays),
    change: (policy, value) => ({
      ...policy,
      runningOut: { ...policy.runningOut, urgentDays: value.toNumber() },
    }),
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
  'outlook.variableCostShare': outlookShare(
    'Sensitivity: share of sales that is variable cost, saved when sales fall',
    'variableCostShare',
  ),
  'outlook.floatingDebtShare': outlookShare(
    'Sensitivity: share of the debt whose interest moves with rates',
    'floatingDebtShare',
  ),
  'outlook.slowerSales.salesFall': scenarioShare('Slower sales', 'slowerSales', 'salesFall'),
  'outlook.slowerSales.workingCapitalLoss': scenarioShare(
    'Slower sales',
    'slowerSales',
    'workingCapitalLoss',
  ),
  'outlook.slowerSales.rateRise': scenarioShare('Slower sales', 'slowerSales', 'rateRise'),
  'outlook.dearerMoney.salesFall': scenarioShare('Dearer money', 'dearerMoney', 'salesFall'),
  'outlook.dearerMoney.workingCapitalLoss': scenarioShare(
    'Dearer money',
    'dearerMoney',
    'workingCapitalLoss',
  ),
  'outlook.dearerMoney.rateRise': scenarioShare('Dearer money', 'dearerMoney', 'rateRise'),
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
 * @example printSetting('thinBelow', decimal('0.1')) // => '10\u00a0%'
 * @example printSetting('stepDown.soonDays', decimal(90)) // => '90 days'
 * @example printSetting('stepDown.soonDays', decimal(1)) // => '1 day'
 */
export function printSetting(key: PolicyKey, value: Decimal): string {
  const { unit } = policySetting(key);
  if (unit === 'share') return formatShareLevel(value);
  return `${value.toFixed()} ${value.eq(1) ? unit.slice(0, -1) : unit}`;
}

/** Why a value cannot stand, in words that say what to do. */
export interface SettingFault {
  readonly key: PolicyKey;
  readonly message: string;
}

/**
 * Why a value cannot be that of the setting by itself; null where it can. In the setting's unit: a share of one, or a
 * count.
 *
 * @example settingFault('thinBelow', decimal('0.6')) // => 'between 1\u00a0% and 50\u00a0%'
 * @example settingFault('repeated.ofLast', decimal('2.5')) // => 'a whole number of tests'
 */
export function settingFault(key: PolicyKey, value: Decimal): string | null {
  const { unit, least, most } = policySetting(key);
  if (unit !== 'share' && !value.isInteger()) return `a whole number of ${unit}`;
  if (value.lt(least) || value.gt(most))
    return `between ${printSetting(key, least)} and ${printSetting(key, most)}`;
  return null;
}

/**
 * What cannot stand together, once every value by itself can.
 *
 * @example policyFaults(POLICY_VERSION_1) // => []
 * @example policyFaults({ ...POLICY_VERSION_1, stepDown: { soonDays: 200, noteDays: 180 } })[0].key // => 'stepDown.soonDays'
 */
export function policyFaults({ repeated, stepDown, runningOut }: Policy): readonly SettingFault[] {
  const faults: SettingFault[] = [];
  if (repeated.atLeast > repeated.ofLast)
    faults.push({
      key: 'repeated.atLeast',
      message: `not more than the ${repeated.ofLast} tests that are looked at`,
    });
  if (stepDown.soonDays > stepDown.noteDays)
    faults.push({
      key: 'stepDown.soonDays',
      message: `not more than the ${stepDown.noteDays} days of the note that comes before`,
    });
  if (runningOut.urgentDays > runningOut.soonDays)
    faults.push({
      key: 'runningOut.urgentDays',
      message: `not more than the ${runningOut.soonDays} days of what comes before`,
    });
  return faults;
}

/** A setting that two policies hold different values of. */
export interface SettingChange {
  readonly key: PolicyKey;
  readonly before: Decimal;
  readonly after: Decimal;
}

/**
 * What differs between two policies, in the register's order.
 *
 * @example policyChanges(POLICY_VERSION_1, { ...POLICY_VERSION_1, qualityWeakBelow: 25 }) // => [{ key: 'qualityWeakBelow', before: 30, after: 25 }]
 */
export const policyChanges = (before: Policy, after: Policy): readonly SettingChange[] =>
  POLICY_KEYS.map((key) => ({
    key,
    before: policySetting(key).read(before),
    after: policySetting(key).read(after),
  })).filter((change) => !change.before.eq(change.after));

/**
 * A policy with some of its values changed. Values are taken as they are: ask `settingFault` and `policyFaults`.
 *
 * @example changedPolicy(POLICY_VERSION_1, { qualityWeakBelow: decimal(25) }).qualityWeakBelow // => 25
 */
export const changedPolicy = (
  policy: Policy,
  values: Readonly<Partial<Record<PolicyKey, Decimal>>>,
): Policy =>
  POLICY_KEYS.reduce((changed, key) => {
    const value = values[key];
    return value === undefined ? changed : policySetting(key).change(changed, value);
  }, policy);
