import { describe, expect, test } from 'vitest';
import { buildYear } from '../covenants/covenant.fixture.ts';
import { buildCovenant, buildLevel } from '../covenants/covenant.fixture.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { testCovenant } from '../covenants/testCovenant.ts';
import { POLICY_VERSION_1 } from '../policy.ts';
import { bookOf } from '../statements/statementBook.ts';
import { peersOfBook } from './peersOfBook.ts';
import { projections, type Projection } from './projection.ts';
import type { RatioAt, RatioSeries } from './ratioSeries.ts';

const at = (testDate: RatioAt['testDate'], ratio: number): RatioAt => ({
  testDate,
  ratio,
  hasEarnings: true,
  level: 3.5,
  leverage: 3,
});

/** Borrowers from number 2 on, whose leverage went from 2 to what is given within a quarter. */
const peersThatWent = (count: number, to: (k: number) => number): RatioSeries[] =>
  Array.from({ length: count }, (_, k) => ({
    borrowerId: k + 2,
    covenantId: k + 2,
    sector: 'glass',
    measure: 'net-leverage',
    bound: 'most',
    points: [at('2026-06-30', 2), at('2026-09-30', to(k))],
  }));

/** Net debt 39 over EBITDA of 13 on 30 September 2026, as given otherwise. */
function projectionOf(
  ratios: readonly RatioSeries[],
  given: Partial<Covenant> = {},
  millions = { ebitda: 13, debt: 45, cash: 6 },
): Projection {
  const covenant = buildCovenant({ firstTestOn: '2026-09-30', ...given });
  const book = bookOf(buildYear('2026-09-30', millions), 12);
  const tested = testCovenant(covenant, book, '2026-09-30', POLICY_VERSION_1, '2026-11-30');
  return projections({ borrowerId: 1, covenants: [covenant] }, [tested], peersOfBook(ratios))[0]!;
}

const nextOf = (...given: Parameters<typeof projectionOf>) => projectionOf(...given).tests[0];

describe('peers', () => {
  test('with 29 changes over the whole book nothing is said but too few peers; 30 and 31 are enough', () => {
    const still = (count: number) => nextOf(peersThatWent(count, () => 2));
    expect(still(29)).toEqual({
      testDate: '2026-12-31',
      quarters: 1,
      kind: 'too few peers',
      level: expect.objectContaining({}) as unknown,
    });
    expect(still(30)).toMatchObject({ kind: 'projected', n: 30, borrowers: 30, word: 'unlikely', share: 0 });
    expect(still(31)).toMatchObject({ kind: 'projected', n: 31 });
  });

  test('thirty changes of four borrowers are too few borrowers, of five enough', () => {
    const long = (borrowers: number) =>
      peersThatWent(borrowers, () => 2).map((one) => ({
        ...one,
        points: Array.from({ length: 9 }, (_, k) =>
          at(
            `20${24 + Math.floor((k + 2) / 4)}-${['03-31', '06-30', '09-30', '12-31'][(k + 2) % 4]!}` as RatioAt['testDate'],
            2,
          ),
        ),
      }));
    expect(nextOf(long(4))?.kind).toBe('too few peers');
    expect(nextOf(long(5))).toMatchObject({ kind: 'projected', n: 40, borrowers: 5 });
  });

  test('never hold the borrower itself', () => {
    const own = peersThatWent(1, () => 9).map((one) => ({ ...one, borrowerId: 1 }));
    expect(nextOf([...own, ...peersThatWent(29, () => 2)])?.kind).toBe('too few peers');
    expect(nextOf([...own, ...peersThatWent(30, () => 2)])).toMatchObject({ n: 30, notMet: 0 });
  });

  test('that lose their earnings count as not met', () => {
    const gone = peersThatWent(40, () => 2).map((one, k) => ({
      ...one,
      points: [one.points[0]!, k < 10 ? { ...one.points[1]!, hasEarnings: false, ratio: 0 } : one.points[1]!],
    }));
    expect(nextOf(gone)).toMatchObject({ kind: 'projected', n: 40, notMet: 10, word: 'possible' });
  });

  test('of one night are built once, whoever asks', () => {
    const ratios = peersThatWent(30, () => 2);
    const peers = peersOfBook(ratios);
    expect(peersOfBook(ratios)).toBe(peers);
    expect(peers('net-leverage', 1)).toBe(peers('net-leverage', 1));
    expect(peers('interest-cover', 1)).toBeNull();
  });

  test('with two covenants on one measure bring one series, the longer', () => {
    const ratios = peersThatWent(30, () => 2);
    const second = { ...ratios[0]!, covenantId: 900, points: [at('2026-09-30', 7)] };
    expect(nextOf([second, ...ratios])).toMatchObject({ n: 30, notMet: 0 });
  });
});

describe('levels', () => {
  // Changes of 1.00 to 1.40 in steps of 0.01; without the outermost 1.01 to 1.39.
  const rising = peersThatWent(41, (k) => 2 * (1 + k / 100));

  test('that step down before the test are taken in', () => {
    const levels = [buildLevel('2026-01-01', '2026-12-30', '3.5'), buildLevel('2026-12-31', null, '3.1')];
    // Beyond 3.5 / 3 = 1.1667 lie 1.17 to 1.39; beyond 3.1 / 3 = 1.0333 lie 1.04 to 1.39.
    const [before, after] = [nextOf(rising), nextOf(rising, { levels })];
    expect(before).toMatchObject({ notMet: 23, n: 39, word: 'open' });
    expect(after).toMatchObject({ notMet: 36, n: 39, word: 'likely' });
  });

  test('on a holiday, or on a day without one, there is nothing to project', () => {
    const holiday = [
      buildLevel('2026-01-01', '2026-10-30', '3.5'),
      buildLevel('2026-10-31', '2027-01-31', null),
    ];
    const found = projectionOf(rising, { levels: holiday }).tests;
    expect(found[0]).toMatchObject({ kind: 'nothing to project', reason: 'covenant holiday' });
    expect(found[1]).toMatchObject({ kind: 'nothing to project', reason: 'no level in force' });
  });

  test('that make it likely say at which result it would be open', () => {
    const coming = nextOf(rising, { levels: [buildLevel('2026-01-01', null, '3.1')] });
    if (coming?.kind !== 'projected') throw new Error('not projected');
    // At most 25 of 39 may lie beyond level / result: those from 1.15 on.
    expect(coming.openAt).toBeCloseTo(3.1 / 1.14, 12);
  });
});

describe('test dates', () => {
  const still = peersThatWent(30, () => 2);
  const datesOf = (given: Partial<Covenant>) =>
    projectionOf(still, given).tests.map(({ testDate, quarters }) => [testDate, quarters]);

  test('within four quarters follow the rhythm of the agreement', () => {
    expect(datesOf({})).toEqual([
      ['2026-12-31', 1],
      ['2027-03-31', 2],
      ['2027-06-30', 3],
      ['2027-09-30', 4],
    ]);
    expect(datesOf({ everyMonths: 6 })).toEqual([
      ['2027-03-31', 2],
      ['2027-09-30', 4],
    ]);
    expect(datesOf({ everyMonths: 12 })).toEqual([['2027-09-30', 4]]);
  });

  test('beyond what the book’s changes reach have too few peers', () => {
    expect(projectionOf(still).tests.map(({ kind }) => kind)).toEqual([
      'projected',
      'too few peers',
      'too few peers',
      'too few peers',
    ]);
  });
});

describe('results without meaning are carried nowhere', () => {
  const still = peersThatWent(30, () => 2);

  test('net cash', () => {
    const found = projectionOf(still, {}, { ebitda: 13, debt: 5, cash: 6 });
    expect(found).toMatchObject({ tests: [], reason: 'net cash: there is no ratio to carry on' });
  });

  test('earnings that are not positive', () => {
    const found = projectionOf(still, {}, { ebitda: -1, debt: 45, cash: 6 });
    expect(found).toMatchObject({ tests: [], reason: 'earnings not positive: ratio has no meaning' });
  });

  test('a covenant that is not tested, or has no figures', () => {
    expect(projectionOf(still, { levels: [] })).toMatchObject({ tests: [], fromTestDate: null });
    expect(
      projections({ borrowerId: 1, covenants: [buildCovenant()] }, [], peersOfBook(still)),
    ).toMatchObject([{ tests: [], reason: 'no test with figures yet' }]);
  });
});
