import { describe, expect, test } from 'vitest';
import { addDays, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import { isLei } from '../../src/core/lei.ts';
import { SCENARIOS, type Scenario } from './borrowerTable.ts';
import { demoBook } from './demoBook.ts';
import type { DemoBorrower } from './demoBorrower.ts';
import { businessDayBefore, latestReportedQuarterEnd } from './demoDays.ts';
import { SECTOR_PROFILES } from './sectorProfiles.ts';
import { faultsOf } from './identities.fixture.ts';
import {
  cashConversion,
  interestCover,
  netDebt,
  quarterEbitda,
  receivableDays,
  yearEbitda,
} from './ratios.ts';
import { lowestRoom, roomsOf, testsOf } from './testsOf.fixture.ts';
import { QUARTERS_REPORTED } from './tradingPlan.ts';

const SEED_DAY: PlainDate = '2026-12-01';
const LATEST = QUARTERS_REPORTED - 1;
const book = demoBook(SEED_DAY);
const told = (scenario: Scenario): DemoBorrower[] =>
  book.filter((borrower) => borrower.scenario === scenario);
const oneOf = (scenario: Scenario): DemoBorrower => {
  const [borrower] = told(scenario);
  if (!borrower) throw new Error(`nobody is ${scenario}`);
  return borrower;
};
const latestRoom = (borrower: DemoBorrower, measure: string): number =>
  roomsOf(borrower, measure).at(-1)?.room ?? Number.NaN;

describe('the book', () => {
  test('has sixty borrowers in eight sectors, three of at least twelve and one of two', () => {
    const sizes = Object.values(SECTOR_PROFILES).map(
      ({ code }) => book.filter(({ sector }) => sector.code === code).length,
    );
    expect(book).toHaveLength(60);
    expect(sizes).toHaveLength(8);
    expect(sizes.filter((size) => size >= 12)).toHaveLength(3);
    expect(sizes.filter((size) => size === 2)).toHaveLength(1);
  });

  test('tells every story, in two currencies, on two desks, with three year ends', () => {
    for (const scenario of SCENARIOS) expect(told(scenario).length, scenario).toBeGreaterThan(0);
    expect(new Set(book.map(({ currency }) => currency))).toEqual(new Set(['EUR', 'GBP']));
    expect(new Set(book.map(({ desk }) => desk)).size).toBe(2);
    expect(new Set(book.map(({ fiscalYearEndMonth }) => fiscalYearEndMonth))).toEqual(new Set([3, 6, 12]));
  });

  test('names everybody once, with an identifier that nobody can hold', () => {
    expect(new Set(book.map(({ name }) => name)).size).toBe(60);
    expect(new Set(book.map(({ lei }) => lei)).size).toBe(60);
    for (const { lei } of book) {
      expect(isLei(lei)).toBe(true);
      expect(lei.startsWith('ZZ00')).toBe(true);
    }
  });

  test('ties to the last thousand in every delivery', () => {
    for (const borrower of book)
      for (const { quarters } of borrower.deliveries) expect(faultsOf(quarters), borrower.name).toEqual([]);
  });

  test('gives every covenant a level on each of its test dates, but for the holiday', () => {
    const without = book.flatMap((borrower) =>
      borrower.covenants.flatMap((covenant) =>
        testsOf(borrower, covenant)
          .filter(({ level }) => level === null)
          .map(() => borrower.scenario),
      ),
    );
    expect(without).toEqual(['covenant holiday', 'covenant holiday']);
  });

  test('has covenants with a step-down, with rounding, and one that is "less than"', () => {
    const covenants = book.flatMap((borrower) => borrower.covenants);
    expect(covenants.filter(({ levels }) => levels.length > 1).length).toBeGreaterThan(50);
    expect(covenants.filter(({ roundingPlaces }) => roundingPlaces === 2).length).toBeGreaterThan(5);
    expect(covenants.filter(({ operator }) => operator === '<')).toHaveLength(1);
    for (const borrower of book) {
      expect(borrower.covenants.length).toBeGreaterThanOrEqual(2);
      expect(borrower.covenants.length).toBeLessThanOrEqual(4);
    }
  });
});

describe('the stories', () => {
  test('healthy borrowers pass their last five tests, and what is tested may fall by more than a tenth', () => {
    // 1/0.9 - 1: a ninth above a minimum is a tenth of the value.
    for (const borrower of told('healthy'))
      expect(lowestRoom(borrower), borrower.name).toBeGreaterThan(0.112);
  });

  test('a part of the book began with tight levels: near the limit on both sides, and loosened since', () => {
    const rooms = book.flatMap((borrower) =>
      borrower.covenants.flatMap(({ measure }) => roomsOf(borrower, measure).map(({ room }) => room)),
    );
    const within = (from: number, until: number) =>
      rooms.filter((room) => room >= from && room < until).length;
    // First tests and those under a reset level do not count where the book is looked over.
    expect(within(-0.1, 0.1)).toBeGreaterThan(150);
    expect(within(-0.1, 0)).toBeGreaterThan(20);
    const resets = book.flatMap(({ covenants }) =>
      covenants.flatMap(({ levels }) => levels.filter(({ isReset }) => isReset)),
    );
    expect(resets.length).toBeGreaterThan(10);
  });

  test('thin headroom is between the just-passing band and ten percent', () => {
    for (const borrower of told('thin headroom')) {
      expect(latestRoom(borrower, 'net-leverage')).toBeGreaterThan(0.02);
      expect(latestRoom(borrower, 'net-leverage')).toBeLessThan(0.1);
    }
  });

  test('just passing: five tests in a row in the 2 % band, on add-backs, while cash falls behind', () => {
    const borrower = oneOf('just passing on add-backs');
    const lastFive = roomsOf(borrower, 'net-leverage').slice(-5);
    for (const { room, level, roomWithoutAddBacks } of lastFive) {
      expect(level).toBe(3.5);
      expect(room).toBeGreaterThanOrEqual(0);
      expect(room).toBeLessThan(0.02);
      expect(roomWithoutAddBacks).toBeLessThan(0);
    }
    const { quarters } = borrower;
    expect(cashConversion(quarters, LATEST)).toBeLessThan((cashConversion(quarters, LATEST - 6) ?? 0) - 0.2);
    const [now, yearAgo] = [quarters[LATEST], quarters[LATEST - 4]];
    if (!now || !yearAgo) throw new Error('quarters expected');
    expect(receivableDays(now) / receivableDays(yearAgo)).toBeGreaterThan(1.2);
    expect(borrower.covenants[0]?.levels.at(-1)).toEqual({ from: '2026-12-31', until: null, level: 3.25 });
  });

  test('met only with add-backs: room with them, not met without', () => {
    const latest = roomsOf(oneOf('met only with add-backs'), 'net-leverage').at(-1);
    expect(latest?.room).toBeGreaterThan(0.1);
    expect(latest?.roomWithoutAddBacks).toBeLessThan(0);
  });

  test('add-backs stay within their cap of a quarter of EBITDA', () => {
    for (const borrower of book)
      for (const covenant of borrower.covenants)
        for (const { addBacks, ebitda } of testsOf(borrower, covenant))
          if (addBacks > 0) expect(addBacks, borrower.name).toBeLessThan(0.25 * ebitda);
  });

  test('growing fast: revenue up a third, receivable days as ever, every test met', () => {
    for (const borrower of told('growing fast')) {
      const year = (end: number): number =>
        borrower.quarters.slice(end - 3, end + 1).reduce((sum, { lines }) => sum + lines.revenue, 0);
      expect(year(LATEST) / year(LATEST - 4)).toBeGreaterThan(1.3);
      const days = borrower.quarters.map(receivableDays);
      expect((days[LATEST] ?? 0) / (days[LATEST - 4] ?? 1)).toBeLessThan(1.08);
      expect(lowestRoom(borrower)).toBeGreaterThan(0.1);
    }
  });

  test('seasonal: the best quarter sells nearly twice the worst, and every test is met', () => {
    for (const borrower of told('seasonal')) {
      const lastYear = borrower.quarters.slice(-4).map(({ lines }) => lines.revenue);
      expect(Math.max(...lastYear) / Math.min(...lastYear)).toBeGreaterThan(1.8);
      expect(lowestRoom(borrower)).toBeGreaterThan(0.1);
    }
  });

  test('not met and waived: met until the latest test, which is waived', () => {
    const borrower = oneOf('not met and waived');
    const rooms = roomsOf(borrower, 'net-leverage');
    expect(rooms.at(-1)?.room).toBeLessThan(0);
    for (const { room } of rooms.slice(0, -1)) expect(room).toBeGreaterThan(0);
    expect(borrower.covenants[0]?.waiver?.testDate).toBe(borrower.quarters.at(-1)?.quarterEnd);
  });

  test('interest cover not met: the latest cover is below its level, leverage is not above', () => {
    const borrower = oneOf('interest cover not met');
    expect(latestRoom(borrower, 'interest-cover')).toBeLessThan(0);
    expect(latestRoom(borrower, 'net-leverage')).toBeGreaterThan(0.1);
    expect(interestCover(borrower.quarters, LATEST)).toBeGreaterThan(1);
  });

  test('restated: a past year has two versions whose EBITDA lies more than 2 % apart', () => {
    const [first, second] = oneOf('restated').deliveries;
    if (!first || !second) throw new Error('two deliveries expected');
    const yearEnd = first.quarters.length - 1;
    const restated = second.quarters.slice(0, 4);
    expect(restated.map(({ quarterEnd }) => quarterEnd)).toEqual(
      first.quarters.slice(-4).map(({ quarterEnd }) => quarterEnd),
    );
    const now = restated.reduce((sum, quarter) => sum + quarterEbitda(quarter), 0);
    expect((yearEbitda(first.quarters, yearEnd) ?? 0) / now).toBeGreaterThan(1.02);
  });

  test('ratio without meaning: EBITDA of the latest year is negative and there is debt', () => {
    const borrower = oneOf('ratio without meaning');
    expect(yearEbitda(borrower.quarters, LATEST)).toBeLessThan(0);
    expect(yearEbitda(borrower.quarters, LATEST - 1)).toBeGreaterThan(0);
    expect(borrower.quarters[LATEST]?.lines.senior_debt).toBeGreaterThan(0);
  });

  test('net cash: more cash than debt, earnings, and no interest to cover', () => {
    const borrower = oneOf('net cash');
    for (const quarter of borrower.quarters) {
      expect(netDebt(quarter)).toBeLessThan(0);
      expect(quarter.lines.interest_paid).toBe(0);
    }
    expect(yearEbitda(borrower.quarters, LATEST)).toBeGreaterThan(0);
  });

  test('quality fell: receivables grew a third faster than sales, and the covenants do not show it', () => {
    const { quarters } = oneOf('quality fell');
    const [now, yearAgo] = [quarters[LATEST]?.lines, quarters[LATEST - 4]?.lines];
    if (!now || !yearAgo) throw new Error('quarters expected');
    expect(now.receivables / yearAgo.receivables).toBeGreaterThan((now.revenue / yearAgo.revenue) * 1.33);
    expect(lowestRoom(oneOf('quality fell'))).toBeGreaterThan(0.1);
  });

  test.each([
    ['step-down ahead', 0, 90],
    ['step-down later', 90, 180],
  ] as const)(
    '%s: the latest result fails a level that comes into force within its days',
    (scenario, from, to) => {
      const borrower = oneOf(scenario);
      const ahead = borrower.covenants[0]?.levels.at(-1);
      const value = testsOf(borrower, borrower.covenants[0]).at(-1)?.value ?? Number.NaN;
      const asOf = businessDayBefore(SEED_DAY);
      expect(latestRoom(borrower, 'net-leverage')).toBeGreaterThan(0.02);
      expect(value).toBeGreaterThan(ahead?.level ?? Number.NaN);
      expect(ahead && ahead.from > addDays(asOf, from) && ahead.from <= addDays(asOf, to)).toBe(true);
    },
  );

  test('thin current ratio and thin liquidity: the tested amount may fall by less than a tenth', () => {
    for (const [scenario, measure] of [
      ['thin current ratio', 'current-ratio'],
      ['thin liquidity', 'minimum-liquidity'],
    ] as const) {
      const room = latestRoom(oneOf(scenario), measure);
      expect(1 - 1 / (1 + room)).toBeGreaterThan(0.02);
      expect(1 - 1 / (1 + room)).toBeLessThan(0.1);
    }
  });
});

describe.each(['2026-11-14', '2026-12-31', '2027-02-15'] as const)('laid out on %s', (seedDay) => {
  const laid = demoBook(seedDay);
  const latest = latestReportedQuarterEnd(seedDay);
  const asOf = businessDayBefore(seedDay);
  const dueOf = ({ dueDays }: DemoBorrower): PlainDate => addDays(latest, dueDays);

  test('all but the late have delivered the latest quarter, before the night that assesses it', () => {
    for (const borrower of laid) {
      const last = borrower.deliveries.at(-1);
      const isLate = borrower.owed !== null;
      expect(last?.quarters.at(-1)?.quarterEnd === latest, borrower.name).toBe(!isLate);
      expect(last && last.receivedOn <= asOf).toBe(true);
      if (borrower.covenants.some(({ waiver }) => waiver && waiver.grantedOn > asOf))
        throw new Error('waived before it was asked for');
    }
  });

  test('one of the late is past grace, the other within', () => {
    const [late] = laid.filter(({ scenario }) => scenario === 'late');
    const [within] = laid.filter(({ scenario }) => scenario === 'late within grace');
    if (!late || !within) throw new Error('two late borrowers expected');
    expect(addDays(dueOf(late), late.graceDays) < asOf).toBe(true);
    expect(dueOf(within) < asOf).toBe(true);
    expect(addDays(dueOf(within), within.graceDays) >= asOf).toBe(true);
  });
});
