import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { buildCovenant, buildLevel, buildYear } from '../covenants/covenant.fixture.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { isNotMet } from '../covenants/covenantTest.ts';
import { verdictOn } from '../covenants/holdAgainstLevel.ts';
import { testCovenant } from '../covenants/testCovenant.ts';
import { MEASURES } from '../measures/index.ts';
import { MEASURE_CODES, type MeasureCode } from '../measures/measure.ts';
import { decimal, ZERO, type Decimal } from '../money/decimal.ts';
import { POLICY_VERSION_1 } from '../policy.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import { openBooks } from '../statements/statementBook.ts';
import { sidesAfter, type Blow, type Struck } from './blow.ts';
import { shareBeforeNotMet } from './breakEven.ts';
import { everyNotMet, firstNotMet, sensitivity, type BreakEven } from './sensitivity.ts';

/** Sales 80, EBITDA 15, interest 2.5, debt 48, cash 6, receivables 12 and stocks 8. */
const figures = [
  ...buildYear('2026-09-30', { ebitda: 15, debt: 48, cash: 6 }).slice(0, 1),
  buildStatement('2026-09-30', 0, {
    senior_debt: 48,
    cash: 6,
    receivables: 12,
    inventory: 8,
    current_assets: 30,
    current_liabilities: 20,
  }),
];

const covenantOn = (measure: MeasureCode, level: string, given: Partial<Covenant> = {}): Covenant =>
  buildCovenant({
    measure,
    name: measure,
    operator: MEASURES[measure].shape === 'burden' ? '<=' : '>=',
    firstTestOn: '2026-09-30',
    levels: [buildLevel('2026-01-01', null, level)],
    ...given,
  });

const policy = { ...POLICY_VERSION_1.outlook, variableCostShare: decimal('0.6') };

function sensitivityOf(covenants: readonly Covenant[], statements = figures) {
  const numbered = covenants.map((covenant, place) => ({ ...covenant, id: place + 1 }));
  const books = openBooks({ statements, fiscalYearEndMonth: 12 }, '2026-11-30');
  const tests = numbered.map((covenant) =>
    testCovenant(covenant, books.group, '2026-09-30', POLICY_VERSION_1, '2026-11-30'),
  );
  return sensitivity(numbered, tests, books, policy);
}

const shareOf = (found: BreakEven): string =>
  found.kind === 'at' ? found.share.toSignificantDigits(8).toString() : found.kind;
const sharesOf = (...given: Parameters<typeof covenantOn>) => {
  const { breakEvens } = sensitivityOf([covenantOn(...given)]).tests[0]!;
  return Object.fromEntries(Object.entries(breakEvens).map(([factor, found]) => [factor, shareOf(found)]));
};

describe('by hand, on sales of 80, EBITDA of 15, debt of 48, cash of 6, receivables and stocks of 20', () => {
  test('net leverage of at most 3.50x: (52.5 - 42) / (3.5 x 15), / (3.5 x 80 x 0.4), / 20, all three', () => {
    // 10.5 / 52.5 = .2; 10.5 / 112 = .09375; 10.5 / 20 = .525; 10.5 / (52.5 + 112 + 20) = .056910569
    expect(sharesOf('net-leverage', '3.5')).toEqual({
      earnings: '0.2',
      sales: '0.09375',
      'working capital': '0.525',
      rates: 'not reached',
      together: '0.056910569',
    });
  });

  test('interest cover of at least 3.00x: 15 - 7.5 of earnings, 15 / 3 - 2.5 of interest on debt of 48', () => {
    // 7.5 / 15; 7.5 / 32; 2.5 / 48; together 7.5 / (15 + 32) = .15957447
    expect(sharesOf('interest-cover', '3')).toEqual({
      earnings: '0.5',
      sales: '0.234375',
      'working capital': 'not reached',
      rates: '0.052083333',
      together: '0.15957447',
    });
  });

  test('total leverage rises only by what cash does not cover', () => {
    // At most 4.00x: 60 - 48 = 12 of debt, after 6 of cash: 18 of 20.
    expect(sharesOf('total-leverage', '4')['working capital']).toBe('0.9');
    // At most 4.60x: 69 - 48 = 21, and only 14 would be drawn.
    expect(sharesOf('total-leverage', '4.6')['working capital']).toBe('never');
  });

  test('a cap on netting lets the cash above it go first', () => {
    const definition = { ...covenantOn('net-leverage', '3.5').definition, cashNettingCap: decimal(4) };
    // Net debt 44, room 8.5, and 2 of cash that was not netted: 10.5 of 20.
    expect(sharesOf('net-leverage', '3.5', { definition })['working capital']).toBe('0.525');
  });

  test('liquidity and the current ratio lose what does not come in, and nothing by earnings', () => {
    expect(sharesOf('minimum-liquidity', '4')).toEqual({
      earnings: 'not reached',
      sales: 'not reached',
      'working capital': '0.1',
      rates: 'not reached',
      together: '0.1',
    });
    // 30 - 1.2 x 20 = 6 of 20.
    expect(sharesOf('current-ratio', '1.2')['working capital']).toBe('0.3');
  });

  test('money stands beside each share', () => {
    const { breakEvens } = sensitivityOf([covenantOn('net-leverage', '3.5')]).tests[0]!;
    expect(breakEvens.earnings).toMatchObject({ kind: 'at', amount: decimal(3) });
    expect(breakEvens.sales).toMatchObject({ kind: 'at', amount: decimal('7.5') });
  });
});

test('what earnings may fall by is the headroom of the test', () => {
  for (const [measure, level] of [
    ['net-leverage', '3.3'],
    ['interest-cover', '2.7'],
  ] as const) {
    const covenant = covenantOn(measure, level);
    const books = openBooks({ statements: figures, fiscalYearEndMonth: 12 }, '2026-11-30');
    const tested = testCovenant(covenant, books.group, '2026-09-30', POLICY_VERSION_1, '2026-11-30');
    const { earnings } = sensitivity([covenant], [tested], books, policy).tests[0]!.breakEvens;
    if (earnings.kind !== 'at') throw new Error(earnings.kind);
    expect(earnings.share.toSignificantDigits(30).toString()).toBe(
      tested.headroom.mayFall!.toSignificantDigits(30).toString(),
    );
  }
});

describe('what cannot be said', () => {
  test('a test that is not met already has no room', () => {
    expect(sharesOf('net-leverage', '2.7')['earnings']).toBe('not met already');
  });

  test('a line that the accounts lack is named where the test rests on it, and only there', () => {
    const balance = buildStatement('2026-09-30', 0, { senior_debt: 48, cash: 6 });
    const { tests } = sensitivityOf(
      [covenantOn('net-leverage', '3.5'), covenantOn('interest-cover', '3')],
      [figures[0]!, balance],
    );
    expect(tests[0]?.breakEvens['working capital']).toEqual({
      kind: 'unknown',
      reason: 'no receivables or stocks',
    });
    expect(tests[0]?.scenarios['slower sales']).toMatchObject({ kind: 'unknown' });
    expect(tests[1]?.scenarios['slower sales'].kind).toBe('computed');
  });

  test('a test without a result stands in none of it', () => {
    expect(sensitivityOf([covenantOn('net-leverage', '3.5', { levels: [] })]).tests).toEqual([]);
  });

  test('net cash turns to debt only with the cash that is gone', () => {
    const rich = [
      figures[0]!,
      buildStatement('2026-09-30', 0, { senior_debt: 5, cash: 15, receivables: 80, inventory: 20 }),
    ];
    const { breakEvens } = sensitivityOf([covenantOn('net-leverage', '1')], rich).tests[0]!;
    expect(breakEvens.earnings).toEqual({ kind: 'never' });
    // Net debt -10 + 100 w = 15.
    expect(shareOf(breakEvens['working capital'])).toBe('0.25');
  });
});

describe('scenarios', () => {
  test('recompute every live test at the sizes of the policy', () => {
    const sensitive = sensitivityOf([covenantOn('net-leverage', '3.3'), covenantOn('interest-cover', '4')]);
    const slower = sensitive.tests.map(({ scenarios }) => scenarios['slower sales']);
    const dearer = sensitive.tests.map(({ scenarios }) => scenarios['dearer money']);
    // EBITDA 15 - .1 x 80 x .4 = 11.8, net debt 42 + .05 x 20 = 43; interest 2.5.
    expect(slower).toMatchObject([
      { tested: decimal(43).div('11.8'), outcome: 'not met' },
      { tested: decimal('11.8').div('2.5'), outcome: 'met' },
    ]);
    // EBITDA 15 - .03 x 32 = 14.04; interest 2.5 + .02 x 48 = 3.46.
    expect(dearer).toMatchObject([
      { tested: decimal(42).div('14.04'), outcome: 'met' },
      { tested: decimal('14.04').div('3.46'), outcome: 'met' },
    ]);
  });

  test('follow the policy', () => {
    const covenant = covenantOn('interest-cover', '4');
    const books = openBooks({ statements: figures, fiscalYearEndMonth: 12 }, '2026-11-30');
    const tested = testCovenant(covenant, books.group, '2026-09-30', POLICY_VERSION_1, '2026-11-30');
    const dearer = { ...policy.dearerMoney, salesFall: ZERO, rateRise: decimal('0.05') };
    const half = { ...policy, floatingDebtShare: decimal('0.5'), dearerMoney: dearer };
    const { scenarios } = sensitivity([covenant], [tested], books, half).tests[0]!;
    // Interest 2.5 + .05 x 24 = 3.7.
    expect(scenarios['dearer money']).toMatchObject({ tested: decimal(15).div('3.7') });
  });
});

test('our own trigger is never not met: it has words of its own', () => {
  const { scenarios } = sensitivityOf([covenantOn('net-leverage', '3.3', { isOurs: true })]).tests[0]!;
  expect(scenarios['slower sales']).toMatchObject({ outcome: 'above our trigger' });
});

describe('reverse stress', () => {
  const two = sensitivityOf([covenantOn('net-leverage', '3.5'), covenantOn('interest-cover', '3')]).tests;

  test('names the first test and the share at which none is met', () => {
    expect(firstNotMet(two, 'together')).toMatchObject({ covenantId: 1 });
    expect(everyNotMet(two)?.toSignificantDigits(8).toString()).toBe('0.15957447');
  });

  test('has no share at which all fail where one rests on none of it', () => {
    const value = two.map((one, place) =>
      place === 0
        ? { ...one, breakEvens: { ...one.breakEvens, together: { kind: 'not reached' } as const } }
        : one,
    );
    expect(everyNotMet(value)).toBeNull();
    expect(everyNotMet([])).toBeNull();
  });

  test('names the first of those that are met, and counts one that is not met already among all', () => {
    const failed = sensitivityOf([
      covenantOn('net-leverage', '2.7'),
      covenantOn('interest-cover', '3'),
    ]).tests;
    expect(firstNotMet(failed, 'sales')).toMatchObject({ covenantId: 2 });
    expect(firstNotMet(failed.slice(0, 1), 'sales')).toBeNull();
    expect(everyNotMet(failed)?.toSignificantDigits(8).toString()).toBe('0.15957447');
  });
});

test('up to the share the test is not failed, beyond it it is, whatever the sides', () => {
  const whole = fc.integer({ min: -60, max: 60 });
  const size = fc.integer({ min: 0, max: 80 });
  const measure = fc.constantFrom(...MEASURE_CODES);
  const level = fc.integer({ min: 1, max: 40 }).map((tenths) => decimal(tenths).div(10));
  fc.assert(
    fc.property(
      measure,
      whole,
      whole,
      level,
      fc.tuple(size, size, size, size),
      (code, n, d, limit, sizes) => {
        const [earnings, cash, interest, held] = sizes.map((one) => decimal(one)) as [
          Decimal,
          Decimal,
          Decimal,
          Decimal,
        ];
        const { shape } = MEASURES[code];
        const struck: Struck = {
          measure: code,
          definition: {
            ...covenantOn('net-leverage', '1').definition,
            cashNettingCap: d > 30 ? decimal(5) : null,
          },
          sides: { numerator: decimal(n), denominator: shape === 'amount' ? null : decimal(d) },
          cash: held,
        };
        const blow: Blow = { earnings, cash, interest };
        const terms = {
          operator: shape === 'burden' ? '<=' : '>=',
          level: limit,
          roundingPlaces: null,
        } as const;
        const failsAt = (share: Decimal): boolean =>
          isNotMet(verdictOn(MEASURES[code], sidesAfter(struck, blow, share), terms).outcome);
        const found = shareBeforeNotMet(struck, terms, blow);
        const steps = Array.from({ length: 41 }, (_, k) => decimal(k).div(40));
        const tiny = decimal('1e-12');
        if (!found) return steps.every((step) => !failsAt(step) || step.eq(1));
        return (
          failsAt(found.plus(tiny)) && steps.every((step) => step.gte(found.minus(tiny)) || !failsAt(step))
        );
      },
    ),
    { numRuns: 400 },
  );
});

test('every measure says what reaches it', () => {
  const blow: Blow = { earnings: decimal(1), cash: decimal(1), interest: decimal(1) };
  for (const measure of MEASURE_CODES) {
    const sides = { numerator: decimal(10), denominator: decimal(10) };
    const after = sidesAfter(
      { measure, definition: covenantOn('net-leverage', '1').definition, sides, cash: null },
      blow,
      decimal(1),
    );
    const worse =
      MEASURES[measure].shape === 'burden'
        ? after.numerator.gte(10) && after.denominator!.lte(10)
        : after.numerator.lte(10) && after.denominator!.gte(10);
    expect([measure, worse]).toEqual([measure, true]);
  }
});
