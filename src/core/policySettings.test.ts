/** Values of the policy that two persons may change. */
import { describe, expect, test } from 'vitest';
import { decimal, Decimal } from './money/decimal.ts';
import { POLICY_VERSION_1 } from './policy.ts';
import {
  changedPolicy,
  POLICY_KEYS,
  policyChanges,
  policyFaults,
  policySetting,
  printSetting,
  settingFault,
} from './policySettings.ts';

/** Every value of a policy by its path, its version apart. */
const leaves = (value: unknown, path: readonly string[] = []): readonly string[] =>
  typeof value === 'object' && value !== null && !(value instanceof Decimal)
    ? Object.entries(value).flatMap(([name, member]) => leaves(member, [...path, name]))
    : [path.join('.')];

test('the register names every value of the policy, and no other', () => {
  expect([...POLICY_KEYS].sort()).toEqual(
    leaves(POLICY_VERSION_1)
      .filter((path) => path !== 'version')
      .toSorted(),
  );
});

describe.each(POLICY_KEYS)('%s', (key) => {
  const { read, change, least, most, unit } = policySetting(key);

  test('reads back what was put in, and changes nothing else', () => {
    const value = read(POLICY_VERSION_1).plus(unit === 'share' ? '0.005' : 1);
    const changed = change(POLICY_VERSION_1, value);
    expect(read(changed)).toEqual(value);
    expect(policyChanges(POLICY_VERSION_1, changed)).toEqual([
      { key, before: read(POLICY_VERSION_1), after: value },
    ]);
  });

  test('takes its bounds and refuses what lies beyond them', () => {
    const step = unit === 'share' ? decimal('0.0001') : decimal(1);
    expect(settingFault(key, least)).toBeNull();
    expect(settingFault(key, most)).toBeNull();
    expect(settingFault(key, least.minus(step))).toMatch(/^between /);
    expect(settingFault(key, most.plus(step))).toMatch(/^between /);
  });

  test('is within its bounds in version 1', () => {
    expect(settingFault(key, read(POLICY_VERSION_1))).toBeNull();
  });
});

test('a count is whole', () => {
  expect(settingFault('stepDown.soonDays', decimal('89.5'))).toBe('a whole number of days');
});

test.each([
  [{ 'repeated.atLeast': 6, 'repeated.ofLast': 6 }, []],
  [{ 'repeated.atLeast': 7, 'repeated.ofLast': 6 }, ['repeated.atLeast']],
  [{ 'stepDown.soonDays': 180 }, []],
  [{ 'stepDown.soonDays': 181 }, ['stepDown.soonDays']],
  [{ 'runningOut.urgentDays': 30 }, []],
  [{ 'runningOut.urgentDays': 31 }, ['runningOut.urgentDays']],
] as const)('what cannot stand together is named: %o gives %o', (values, faulty) => {
  const policy = changedPolicy(
    POLICY_VERSION_1,
    Object.fromEntries(Object.entries(values).map(([key, value]) => [key, decimal(value)])),
  );
  expect(policyFaults(policy).map(({ key }) => key)).toEqual(faulty);
});

test('a share is printed with every digit it has', () => {
  expect(printSetting('justPassingBand', decimal('0.02'))).toBe('2\u00a0%');
  expect(printSetting('justPassingBand', decimal('0.01755'))).toBe('1.755\u00a0%');
});
