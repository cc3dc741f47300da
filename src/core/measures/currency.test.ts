import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { addDays, addMonthsToMonthEnd } from '../calendar/plainDate.ts';
import { decimal } from '../money/decimal.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { CurrencyRate } from './definition.ts';
import { minimumLiquidity } from './minimumLiquidity.ts';
import { netLeverage } from './netLeverage.ts';
import { flowIn } from './readLines.ts';
import { EARNING_12, ON, requestOf, sidesOf, textOf } from './request.fixture.ts';
import { rateLines, translationInto } from './translation.ts';

const rate = (kind: CurrencyRate['kind'], periodEnd: PlainDate, value: string, months = 3): CurrencyRate => ({
  from: 'GBP',
  to: 'EUR',
  kind,
  periodStart: kind === 'closing' ? periodEnd : addDays(addMonthsToMonthEnd(periodEnd, -months), 1),
  periodEnd,
  rate: decimal(value),
  source: 'invented fixing',
});
const pound = { currency: 'GBP' } as const;
const ENDS = ['2025-03-31', '2025-06-30', '2025-09-30', '2025-12-31'] as const;
const quarters = (revenue: readonly string[]) =>
  ENDS.map((end, k) => buildStatement(end, 3, { revenue: revenue[k] }, pound));
const averages = (values: readonly string[]) => ENDS.map((end, k) => rate('average', end, values[k] ?? '1'));
const translated = (statements: Parameters<typeof requestOf>[0], rates: readonly CurrencyRate[]) =>
  requestOf(statements, { translation: translationInto('EUR', rates) });

describe('a flow in another currency', () => {
  // cov-017: 2.0, 2.5, 3.0, 2.5 at 1.05, 1.08, 1.10, 1.12.
  test('is the sum of its quarters, each at its own average rate', () => {
    const request = translated(
      quarters(['2', '2.5', '3', '2.5']),
      averages(['1.05', '1.08', '1.10', '1.12']),
    );
    expect(textOf(flowIn(request, 'revenue'))).toBe('10.9');
    expect(request.translation.used()).toHaveLength(4);
  });

  // Own arithmetic: quarters of 20, 25, 30 out of years to date, and 25 of the last.
  test('takes quarters out of years to date', () => {
    const toDate = [20, 45, 75, 100].map((revenue, k) =>
      buildStatement(ENDS[k] ?? ON, 3 * (k + 1), { revenue }, pound),
    );
    const request = translated(toDate, averages(['1.05', '1.08', '1.10', '1.12']));
    // 21 + 27 + 33 + 28.
    expect(textOf(flowIn(request, 'revenue'))).toBe('109');
  });

  test('that comes a year at a time goes at the average of the year', () => {
    const request = translated(
      [buildStatement(ON, 12, { revenue: 10 }, pound)],
      [rate('average', ON, '1.1', 12)],
    );
    expect(textOf(flowIn(request, 'revenue'))).toBe('11');
  });

  test('is not there without a rate, and the rate that lacks is named', () => {
    const request = translated(
      quarters(['2', '2.5', '3', '2.5']),
      averages(['1.05', '1.08', '1.10', '1.12']).toSpliced(1, 1),
    );
    expect(textOf(flowIn(request, 'revenue'))).toBe(
      'figures in GBP, covenant in EUR: no average rate of GBP in EUR over 3 months to 30 Jun 2025 is recorded',
    );
  });

  test('in the covenant’s own currency needs no rate', () => {
    expect(textOf(flowIn(translated([buildStatement(ON, 12, { revenue: 10 })], []), 'revenue'))).toBe('10');
  });
});

describe('a balance in another currency', () => {
  const sheet = buildStatement(ON, 0, { cash: 10 }, pound);

  test('goes at the closing rate of its day', () => {
    const request = translated([sheet], [rate('closing', ON, '1.2'), rate('average', ON, '1.1')]);
    expect(sidesOf(minimumLiquidity.measure(request))).toEqual(['12']);
  });

  test('takes the later known of two rates, and none that is written the other way round', () => {
    const twice = translated([sheet], [rate('closing', ON, '1.2'), rate('closing', ON, '1.3')]);
    expect(sidesOf(minimumLiquidity.measure(twice))).toEqual(['13']);
    const turned = { ...rate('closing', ON, '0.8'), from: 'EUR', to: 'GBP' };
    expect(sidesOf(minimumLiquidity.measure(translated([sheet], [turned])))[0]).toContain(
      'no closing rate of GBP in EUR on 31 Dec 2025 is recorded',
    );
  });
});

describe('leverage in another currency', () => {
  const statements = [
    buildStatement(ON, 12, { ...EARNING_12, net_income: '2.2' }, pound),
    buildStatement(ON, 0, { senior_debt: 30, cash: 0 }, pound),
  ];
  const rates = [rate('average', ON, '1.08', 12), rate('closing', ON, '1.15')];

  // cov-015: 30 over 10 in the currency of the accounts, 34.5 over 10.8 translated.
  test('opens a gap between debt at the closing and earnings at the average rate, which is said', () => {
    const request = translated(statements, rates);
    const measured = netLeverage.measure(request);
    expect(sidesOf(measured)).toEqual(['34.5', '10.8']);
    expect(measured.remarks).toEqual([
      'before add-backs 3.19x in EUR, 3.00x in GBP: the difference is the rates',
    ]);
    expect(rateLines(request.translation).map(({ label, note }) => `${label}: ${note ?? ''}`)).toEqual([
      'Closing rate of GBP in EUR on 31 Dec 2025: invented fixing',
      'Average rate of GBP in EUR over 12 months to 31 Dec 2025: invented fixing',
    ]);
  });

  // cov-016: debt at the average rate too.
  test('stays as it is where the agreement takes the average rate for debt', () => {
    const measured = netLeverage.measure({
      ...translated(statements, rates),
      definition: { ...requestOf([]).definition, debtRate: 'average' },
    });
    expect(sidesOf(measured)).toEqual(['32.4', '10.8']);
  });

  test('takes the mean of the quarters for debt where the quarters have rates', () => {
    const measured = netLeverage.measure({
      ...translated(
        [
          ...ENDS.map((end) =>
            buildStatement(
              end,
              3,
              { net_income: 1, income_tax: 0, interest_expense: 0, depreciation: 0 },
              pound,
            ),
          ),
          buildStatement(ON, 0, { senior_debt: 10, cash: 0 }, pound),
        ],
        averages(['1.0', '1.1', '1.2', '1.3']),
      ),
      definition: { ...requestOf([]).definition, debtRate: 'average' },
    });
    // 10 at the mean of 1.15; EBITDA 1.0 + 1.1 + 1.2 + 1.3.
    expect(sidesOf(measured)).toEqual(['11.5', '4.6']);
  });
});
