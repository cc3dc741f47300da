/** A value of the policy as the form takes it: shares in per cent, counts as they are. */
import { decimal } from '../../core/money/decimal.ts';
import { policySetting, settingFault, type PolicyKey } from '../../core/policySettings.ts';

const NUMBER = /^\d{1,6}([.,]\d{1,6})?$/;

const perCent = (key: PolicyKey): boolean => policySetting(key).unit === 'share';

/** "2" for a share of 0.02. */
export const inputText = (key: PolicyKey, value: string): string =>
  perCent(key) ? decimal(value).times(100).toFixed() : value;

/** What stands behind the field: "%", "days". */
export const inputUnit = (key: PolicyKey): string => (perCent(key) ? '%' : policySetting(key).unit);

export type InputValue =
  { readonly ok: true; readonly value: string } | { readonly ok: false; readonly fault: string };

/** What was typed, as decimal text in the setting's unit, or why it cannot stand. A comma counts as a point. */
export function inputValue(key: PolicyKey, text: string): InputValue {
  const typed = text.trim();
  if (!NUMBER.test(typed)) return { ok: false, fault: 'Give a number.' };
  const number = decimal(typed.replace(',', '.'));
  const value = perCent(key) ? number.div(100) : number;
  const fault = settingFault(key, value);
  return fault === null ? { ok: true, value: value.toFixed() } : { ok: false, fault: `It must be ${fault}.` };
}
