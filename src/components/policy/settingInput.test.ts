import { describe, expect, test } from 'vitest';
import { inputText, inputUnit, inputValue } from './settingInput.ts';

describe('a share', () => {
  test('is typed in per cent and sent as a share of one', () => {
    expect(inputText('justPassingBand', '0.02')).toBe('2');
    expect(inputUnit('justPassingBand')).toBe('%');
    expect(inputValue('justPassingBand', ' 2.5 ')).toEqual({ ok: true, value: '0.025' });
    expect(inputValue('justPassingBand', '1,75')).toEqual({ ok: true, value: '0.0175' });
  });

  test('at its bounds stands, beyond them is refused with both', () => {
    expect(inputValue('thinBelow', '50')).toEqual({ ok: true, value: '0.5' });
    expect(inputValue('thinBelow', '50.1')).toEqual({
      ok: false,
      fault: 'It must be between 1\u00a0% and 50\u00a0%.',
    });
  });
});

describe('a count', () => {
  test('is typed and sent as it is', () => {
    expect(inputText('stepDown.soonDays', '90')).toBe('90');
    expect(inputUnit('stepDown.soonDays')).toBe('days');
    expect(inputValue('stepDown.soonDays', '120')).toEqual({ ok: true, value: '120' });
  });

  test('is whole', () => {
    expect(inputValue('stepDown.soonDays', '90.5')).toEqual({
      ok: false,
      fault: 'It must be a whole number of days.',
    });
  });
});

test.each(['', 'ten', '-5', '1e3', '1.2.3'])('%j is no number', (text) => {
  expect(inputValue('thinBelow', text)).toEqual({ ok: false, fault: 'Give a number.' });
});
