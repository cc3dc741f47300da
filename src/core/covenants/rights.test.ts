/** Rights of an agreement over its tests: methods.md A6. Ids are those of tests/reference/covenant-vectors.json. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { decimal, type Decimal } from '../money/decimal.ts';
import { netLeverage } from '../measures/netLeverage.ts';
import { interestCover } from '../measures/interestCover.ts';
import { POLICY_VERSION_1 as policy } from '../policy.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { openBook } from '../statements/statementBook.ts';
import { buildCovenant, buildLevel, buildYear } from './covenant.fixture.ts';
import type { Covenant, CureRights, EquityCure } from './covenant.ts';
import type { CovenantTest } from './covenantTest.ts';
import { cureNeeded, sidesWithCure, type CureMethod } from './equityCure.ts';
import { testDates } from './levels.ts';
import { withRights } from './rights.ts';
import { testCovenant } from './testCovenant.ts';

const undertakings = [{ kind: 'compliance certificate', dueDays: 45, dayCount: 'calendar' }] as const;
const RIGHTS: CureRights = {
  method: 'ebitda',
  withinBusinessDays: 15,
  mostInFour: 2,
  mostInLife: 5,
  curedByNextTest: false,
};

const yearly = { firstTestOn: '2024-12-31', everyMonths: 12 } as const;
const buildCure = (given: Partial<EquityCure> = {}): EquityCure => ({
  quarterEnd: '2025-12-31',
  method: 'ebitda',
  amount: decimal(1),
  receivedOn: '2026-02-20',
  ...given,
});

function tested(
  given: Partial<Covenant>,
  statements: readonly Statement[],
  asOf: PlainDate,
): readonly CovenantTest[] {
  const covenant = buildCovenant({ firstTestOn: '2025-12-31', everyMonths: 3, ...given });
  const book = openBook(statements, { scope: covenant.scope, asOf }, 12);
  const tests = testDates(covenant, asOf).map((date) => testCovenant(covenant, book, date, policy, asOf));
  return withRights(covenant, tests, { undertakings, asOf });
}

/** Net debt 45 on EBITDA 12 at the end of 2025: 3.75x against 3.50x, 0.857142… short as EBITDA (cov-067). */
const SHORT = buildYear('2025-12-31', { ebitda: 12, debt: 45, cash: 0 });
const [at] = ['2026-03-01'] as const;
const shortTest = (given: Partial<Covenant>, asOf: PlainDate = at) => tested(given, SHORT, asOf)[0]!;

describe('the cure period', () => {
  test('runs for the agreement’s business days after the certificate is due: 14 February and 15 of them', () => {
    const found = shortTest({ cureRights: RIGHTS });
    expect(found).toMatchObject({
      outcome: 'not met, in cure period',
      underlyingOutcome: 'not met',
      reason: 'cure period until 6 Mar 2026: 1 as EBITDA would cure',
    });
    expect(found.cure?.periodEnds).toBe('2026-03-06');
    expect(found.headroom.absolute?.toFixed(2)).toBe('-0.25');
  });

  test.each([
    ['the day before its last', '2026-03-05', 'not met, in cure period'],
    ['its last day', '2026-03-06', 'not met, in cure period'],
    ['the day after', '2026-03-07', 'not met'],
  ] as const)('is open on %s', (_where, asOf, outcome) => {
    expect(shortTest({ cureRights: RIGHTS }, asOf).outcome).toBe(outcome);
  });

  test('is none where no cure is left, where the agreement gives no right, and where no day is known', () => {
    expect(shortTest({ cureRights: { ...RIGHTS, mostInFour: 0 } }).outcome).toBe('not met');
    expect(shortTest({ cureRights: { ...RIGHTS, mostInLife: 0 } }).outcome).toBe('not met');
    expect(shortTest({}).outcome).toBe('not met');
    const covenant = buildCovenant({ firstTestOn: '2025-12-31', cureRights: RIGHTS });
    const raw = shortTest({});
    const [unknown] = withRights(covenant, [raw], { undertakings: [], asOf: at });
    expect(unknown?.outcome).toBe('not met');
  });
});

describe('an equity cure', () => {
  test.each([
    ['ebitda', '0.8571428571', 'cov-067'],
    ['debt', '3', 'cov-039'],
    ['both', '0.6666666667', 'cov-069'],
  ] as const)('counted as %s needs %s (%s)', (method, needed, _id) => {
    const { cure } = shortTest({ cureRights: { ...RIGHTS, method } });
    expect(cure?.needed[method]?.toDecimalPlaces(10).toFixed()).toBe(needed);
  });

  test('leaves the failure underneath and says the ratio with and without the money', () => {
    const found = shortTest({ cureRights: RIGHTS, cures: [buildCure()] });
    expect(found).toMatchObject({ outcome: 'cured', underlyingOutcome: 'not met', justPassing: false });
    expect(found.tested?.toFixed()).toBe('3.75');
    expect(found.headroom.absolute?.toFixed()).toBe('-0.25');
    expect(found.cure?.ratioWith?.toFixed(6)).toBe('3.500000');
    expect(found.cure?.counted?.toFixed(6)).toBe('0.857143');
    expect(found.cure).toMatchObject({ curedBy: 'money', usedInFour: 1, usedInLife: 1, mostInFour: 2 });
    expect(found.reason).toBe('cured by 1 put in on 20 Feb 2026, counted as EBITDA');
  });

  test.each([
    ['just below what is needed', '2.9999', 'not met, in cure period'],
    ['exactly what is needed', '3', 'cured'],
    ['just above', '3.0001', 'cured'],
  ])('of %s', (_where, amount, outcome) => {
    const cures = [buildCure({ method: 'debt', amount: decimal(amount) })];
    expect(shortTest({ cureRights: { ...RIGHTS, method: 'debt' }, cures }).outcome).toBe(outcome);
  });

  test('that has not come in by the day is not there', () => {
    const cures = [buildCure({ receivedOn: '2026-03-02' })];
    expect(shortTest({ cureRights: RIGHTS, cures }).outcome).toBe('not met, in cure period');
    expect(shortTest({ cureRights: RIGHTS, cures }, '2026-03-02').outcome).toBe('cured');
  });

  test.each([
    [
      'late',
      { cureRights: RIGHTS, cures: [buildCure({ receivedOn: '2026-03-07' })] },
      'the cure period ended on 6 Mar 2026',
    ],
    ['without a right', { cures: [buildCure()] }, 'the agreement gives no right of cure'],
    [
      'counted otherwise',
      { cureRights: RIGHTS, cures: [buildCure({ method: 'debt' })] },
      'recorded as debt repaid, the agreement counts it as EBITDA',
    ],
    [
      'beyond the limit',
      { cureRights: { ...RIGHTS, mostInFour: 0 }, cures: [buildCure()] },
      '0 of 0 cures in four quarters are used',
    ],
  ] as const)('that comes %s does not cure, and says why', (_how, given, why) => {
    const found = shortTest(given, '2026-03-20');
    expect(found.outcome).toBe('not met');
    expect(found.reason).toContain(why);
  });

  test('at a level that must be undershot is not capped at the level itself', () => {
    const cures = (amount: string) => [buildCure({ method: 'debt', amount: decimal(amount) })];
    const strict = { operator: '<', cureRights: { ...RIGHTS, method: 'debt' } } as const;
    expect(shortTest({ ...strict, cures: cures('3') }).outcome).toBe('not met, in cure period');
    expect(shortTest({ ...strict, cures: cures('3.0001') }).outcome).toBe('cured');
  });

  test('counts as EBITDA in its quarter and the next three, and not in the fifth (cov-073)', () => {
    const quarters = ['2025-12-31', '2026-03-31', '2026-06-30', '2026-09-30', '2026-12-31'] as const;
    const statements = quarters.flatMap((end) => buildYear(end, { ebitda: 12, debt: 45, cash: 0 }));
    const found = tested({ cureRights: RIGHTS, cures: [buildCure()] }, statements, '2027-03-30');
    expect(found.map(({ outcome }) => outcome)).toEqual(['cured', 'cured', 'cured', 'cured', 'not met']);
    expect(found.map(({ cure }) => cure?.curedBy)).toEqual([
      'money',
      ...Array.from({ length: 3 }, () => 'money of an earlier quarter'),
      null,
    ]);
    expect(found[3]?.cure?.countsUntil).toBe('2026-09-30');
    expect(found.map(({ underlyingOutcome }) => underlyingOutcome)).toEqual(quarters.map(() => 'not met'));
  });

  test('as debt repaid counts for its own test alone', () => {
    const statements = (['2025-12-31', '2026-03-31'] as const).flatMap((end) =>
      buildYear(end, { ebitda: 12, debt: 45, cash: 0 }),
    );
    const given = {
      cureRights: { ...RIGHTS, method: 'debt' },
      cures: [buildCure({ method: 'debt', amount: decimal(3) })],
    } as const;
    const found = tested(given, statements, '2026-07-30');
    expect(found.map(({ outcome }) => outcome).slice(0, 2)).toEqual(['cured', 'not met']);
  });

  test('the third in four quarters is refused where two are allowed (cov-071)', () => {
    const quarters = ['2025-12-31', '2026-03-31', '2026-06-30'] as const;
    const statements = quarters.flatMap((end) => buildYear(end, { ebitda: 12, debt: 45, cash: 0 }));
    const cures = quarters.map((quarterEnd) =>
      buildCure({ quarterEnd, method: 'debt', amount: decimal(3), receivedOn: quarterEnd }),
    );
    const found = tested({ cureRights: { ...RIGHTS, method: 'debt' }, cures }, statements, '2026-11-30');
    expect(found.slice(0, 3).map(({ outcome }) => outcome)).toEqual(['cured', 'cured', 'not met']);
    expect(found[2]).toMatchObject({ cure: { usedInFour: 2, usedInLife: 2 } });
    expect(found[2]?.reason).toContain('2 of 2 cures in four quarters are used');
  });

  test('of exactly what is needed lands on the level, whichever way it counts', () => {
    const cents = (most: number) => fc.integer({ min: 1, max: most }).map((value) => decimal(value).div(100));
    fc.assert(
      fc.property(
        cents(1e9),
        cents(1e8),
        cents(1_000),
        fc.constantFrom<CureMethod>('ebitda', 'debt', 'both'),
        (numerator, denominator, level, method) => {
          const sides = { numerator, denominator };
          const needed = cureNeeded(netLeverage, sides, level)[method];
          fc.pre(needed !== null && needed.gt(0));
          const cured = sidesWithCure(netLeverage, sides, needed, method);
          const ratio = cured.numerator.div(cured.denominator!);
          expect(ratio.minus(level).abs().lt('1e-18')).toBe(true);
        },
      ),
    );
  });

  test('cures a cover by EBITDA alone: level x charge less what covers', () => {
    const sides = { numerator: decimal(8), denominator: decimal(4) };
    const needed = cureNeeded(interestCover, sides, decimal('2.5'));
    expect(needed.ebitda?.toFixed()).toBe('2');
    expect(needed).toMatchObject({ debt: null, both: null });
  });

  test('no debt repaid carries earnings that are not positive; EBITDA does (cov-031)', () => {
    const needed = cureNeeded(
      netLeverage,
      { numerator: decimal(40), denominator: decimal(-8) },
      decimal('3.5'),
    );
    expect(needed.debt).toBeNull();
    expect(needed.ebitda?.toFixed(10)).toBe('19.4285714286');
  });
});

describe('several payments for one quarter', () => {
  const shortBy = (...cures: readonly Partial<EquityCure>[]) =>
    shortTest({ cureRights: RIGHTS, cures: cures.map(buildCure) }, '2026-04-01');

  test('cure together, in time', () => {
    const found = shortBy({ amount: decimal('0.5') }, { amount: decimal('0.4'), receivedOn: '2026-03-06' });
    expect(found.outcome).toBe('cured');
    expect(found.cure).toMatchObject({ received: decimal('0.9'), receivedOn: '2026-03-06' });
  });

  test('one that comes late takes nothing from those in time, and adds nothing to them', () => {
    const late = { amount: decimal(5), receivedOn: '2026-03-07' } as const;
    expect(shortBy({}, late)).toMatchObject({
      outcome: 'cured',
      cure: { received: decimal(1), receivedOn: '2026-02-20' },
    });
    const found = shortBy({ amount: decimal('0.5') }, late);
    expect(found.outcome).toBe('not met');
    expect(found.reason).toContain('5 more put in is not counted: it came late or counts another way');
  });

  test('one recorded another way than the agreement counts is not added', () => {
    const found = shortBy({ amount: decimal('0.2') }, { amount: decimal(2), method: 'debt' });
    expect(found.outcome).toBe('not met');
    expect(found.cure?.received?.toFixed()).toBe('0.2');
  });
});

describe('a deemed cure', () => {
  const met = buildYear('2026-03-31', { ebitda: 12, debt: 40, cash: 0 });
  const deemed = { cureRights: { ...RIGHTS, curedByNextTest: true } };

  test('is meeting the next test, and says so', () => {
    const [first, second] = tested(deemed, [...SHORT, ...met], '2026-06-01');
    expect(first).toMatchObject({
      outcome: 'cured',
      underlyingOutcome: 'not met',
      reason: 'cured by meeting the next test on 31 Mar 2026',
      cure: { curedBy: 'the next test' },
    });
    expect(second?.outcome).toBe('met, thin');
  });

  test('is none before the next figures, where the next test is not met, and where the agreement gives none', () => {
    expect(tested(deemed, SHORT, '2026-06-01')[0]?.outcome).toBe('not met');
    const again = buildYear('2026-03-31', { ebitda: 12, debt: 45, cash: 0 });
    expect(tested(deemed, [...SHORT, ...again], '2026-07-30')[0]?.outcome).toBe('not met');
    expect(tested({ cureRights: RIGHTS }, [...SHORT, ...met], '2026-06-01')[0]?.outcome).toBe('not met');
  });
});

describe('a waiver', () => {
  const waived = (until: PlainDate | null) => ({
    waivers: [{ testDate: '2025-12-31', grantedOn: '2026-01-15', until, conditions: 'none' }] as const,
  });

  test('stands over the failure and leaves it underneath (cov-074)', () => {
    const found = shortTest({ ...waived(null), cureRights: RIGHTS });
    expect(found).toMatchObject({ outcome: 'not met, waived', underlyingOutcome: 'not met' });
    expect(found.waiver).toMatchObject({ grantedOn: '2026-01-15', until: null });
    expect(found.headroom.absolute?.toFixed()).toBe('-0.25');
  });

  test('says by itself that it has run out', () => {
    expect(shortTest(waived('2026-03-01')).outcome).toBe('not met, waived');
    expect(shortTest(waived('2026-02-28'))).toMatchObject({
      outcome: 'not met',
      reason: 'waiver of 15 Jan 2026 ran out on 28 Feb 2026',
      waiver: null,
    });
  });

  test('never makes a test met, whatever the figures', () => {
    const figure = fc.integer({ min: 1, max: 500 });
    fc.assert(
      fc.property(figure, figure, (ebitda, debt) => {
        const [found] = tested(waived(null), buildYear('2025-12-31', { ebitda, debt, cash: 0 }), at);
        const isMetAlone = debt <= 3.5 * ebitda;
        expect(found?.outcome.startsWith('met')).toBe(isMetAlone);
        expect(found?.underlyingOutcome.startsWith('met')).toBe(isMetAlone);
      }),
      { numRuns: 60 },
    );
  });
});

describe('a reset', () => {
  const levels = [
    buildLevel('2024-01-01', null, '3.5'),
    { ...buildLevel('2025-09-30', null, '4.25'), isReset: true },
  ];

  test('applies from its day on, past tests keep their level, its first test is marked (cov-075)', () => {
    const statements = (['2024-12-31', '2025-12-31'] as const).flatMap((end) =>
      buildYear(end, { ebitda: 12, debt: 45, cash: 0 }),
    );
    const found = tested({ ...yearly, levels }, statements, at);
    expect(found.map(({ outcome, isFirstUnderReset }) => [outcome, isFirstUnderReset])).toEqual([
      ['not met', false],
      ['met', true],
    ]);
    expect(found.map(({ level }) => level?.toFixed())).toEqual(['3.5', '4.25']);
  });
});

describe('a springing covenant', () => {
  const drawn = (amount: string, commitment = '20'): readonly Statement[] => [
    ...SHORT.slice(0, 1),
    buildStatement('2025-12-31', 0, {
      senior_debt: 45,
      cash: 0,
      revolver_drawn: amount,
      revolver_commitment: commitment,
    }),
  ];
  const springing = { springing: { trigger: decimal('0.35') } };
  const on = (amount: string): CovenantTest => tested(springing, drawn(amount), at)[0]!;

  test.each([
    ['below its trigger (cov-064)', '6.5', 'not tested'],
    ['at its trigger (cov-065)', '7', 'not tested'],
    ['just above it (cov-066)', '7.01', 'not met'],
  ])('%s', (_where, amount, outcome) => {
    expect(on(amount).outcome).toBe(outcome);
    expect(on(amount).tested?.toFixed()).toBe('3.75');
  });

  test('says utilisation and trigger, and shows the ratio anyway', () => {
    expect(on('6.5').reason).toBe('drawn 7 of 20 (32.5\u00a0%): tested only above 35\u00a0%');
    expect(on('6.5').springing?.utilisation?.toFixed()).toBe('0.325');
  });

  test('says its trigger with every digit that it has', () => {
    const withHalf = { springing: { trigger: decimal('0.375') } };
    expect(tested(withHalf, drawn('6.5'), at)[0]?.reason).toContain('tested only above 37.5\u00a0%');
  });

  test('cannot be tested where nobody knows what is drawn', () => {
    expect(tested(springing, SHORT, at)[0]).toMatchObject({ outcome: 'cannot be tested', springing: null });
    expect(tested(springing, drawn('0', '0'), at)[0]?.outcome).toBe('cannot be tested');
  });
});

describe('the desk’s own trigger', () => {
  const figures = (debt: number) => buildYear('2025-12-31', { ebitda: 12, debt, cash: 0 });
  const against = (debt: number, given: Partial<Covenant> = {}): CovenantTest =>
    tested({ isOurs: true, ...given }, figures(debt), at)[0]!;

  test('is tested the same way and never called not met', () => {
    expect(against(42).outcome).toBe('met, thin');
    expect(against(42.1)).toMatchObject({ outcome: 'above our trigger', underlyingOutcome: 'not met' });
    expect(against(42.1, { cureRights: RIGHTS, cures: [buildCure()] }).outcome).toBe('above our trigger');
  });
});

test('the amounts of a cure are exact decimals', () => {
  const amount: Decimal | null | undefined = shortTest({ cureRights: { ...RIGHTS, method: 'debt' } }).cure
    ?.needed.debt;
  expect(amount?.toFixed()).toBe('3');
});
