import { describe, expect, test } from 'vitest';
import { decimal } from '../money/decimal.ts';
import type { Headroom, Outcome } from './covenantTest.ts';
import { whatIsLeft } from './whatIsLeft.ts';

const headroom = (mayFall: string | null, moneyLeft: string | null): Headroom => ({
  absolute: null,
  shareOfLevel: null,
  mayFall: mayFall === null ? null : decimal(mayFall),
  fallOf: 'earnings',
  moneyLeft: moneyLeft === null ? null : decimal(moneyLeft),
  otherSideMayRise: null,
  otherSideShare: null,
});

const left = (
  measure: 'net-leverage' | 'interest-cover' | 'minimum-liquidity',
  outcome: Outcome,
  room: Headroom,
  reason: string | null = null,
) => whatIsLeft({ measure, outcome, headroom: room, reason });

describe('what is left', () => {
  test('a met test says what may be lost, in money and as a share', () => {
    expect(left('net-leverage', 'met, thin', headroom('0.0142', '221400'))).toBe(
      'EBITDA may fall 221.4k (1.4\u00a0%)',
    );
    expect(left('minimum-liquidity', 'met', headroom('0.2857', '2000000'))).toBe(
      'Liquidity may fall 2.0m (28.6\u00a0%)',
    );
  });

  test('a test that is not met says what it is short of, without a minus sign', () => {
    expect(left('interest-cover', 'not met', headroom('-0.06', '-312000'))).toBe(
      'EBITDA 312.0k short (6.0\u00a0%)',
    );
  });

  test('the outcome decides, where rounding or a strict operator puts it against the unrounded figure', () => {
    expect(left('net-leverage', 'met, thin', headroom('-0.001', '-12000'))).toBe(
      'Nothing: met only as the agreement rounds',
    );
    expect(left('net-leverage', 'not met', headroom('0.0005', '6000'))).toBe(
      'Nothing: not met as the agreement rounds',
    );
    expect(left('net-leverage', 'not met', headroom('0', '0'))).toBe(
      'Nothing: at its level, which is not enough',
    );
  });

  test('where a figure has no meaning the reason stands, never a number', () => {
    expect(
      left(
        'net-leverage',
        'not met, ratio has no meaning',
        headroom(null, null),
        'earnings not positive: ratio has no meaning',
      ),
    ).toBe('earnings not positive: ratio has no meaning');
    expect(left('net-leverage', 'met, net cash', headroom('1', '5000000'))).toBe(
      'Net cash: no debt to carry',
    );
    expect(left('interest-cover', 'awaiting figures', headroom(null, null), 'accounts not delivered')).toBe(
      'accounts not delivered',
    );
  });
});
