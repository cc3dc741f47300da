/** The whole demo book, worked out from nothing but the day on which it is laid out. */
import {
  addDays,
  addMonthsToMonthEnd,
  daysBetween,
  type PlainDate,
} from '../../src/core/calendar/plainDate.ts';
import { leiCheckDigits } from '../../src/core/lei.ts';
import { BORROWER_ROWS, type BorrowerRow, type Scenario } from './borrowerTable.ts';
import { covenantsFor } from './covenantPlans.ts';
import type { DemoBorrower, DemoDelivery, DemoFacility } from './demoBorrower.ts';
import { businessDayBefore, latestReportedQuarterEnd, quarterEndOnOrAfter } from './demoDays.ts';
import type { DemoQuarter } from './demoLines.ts';
import { furtherCovenants } from './furtherCovenants.ts';
import { randomNumbers, type RandomNumbers } from './randomNumbers.ts';
import { asFirstReported } from './restatement.ts';
import { plannedFor } from './scenarioPlans.ts';
import { springingCovenant, withDemoRights } from './rightsPlans.ts';
import { SECTOR_PROFILES } from './sectorProfiles.ts';
import { tradingYears } from './tradingYears.ts';
import { ORDINARY, quartersUpTo, type CalendarQuarter, type TradingPlan } from './tradingPlan.ts';

export function demoBook(
  seedDay: PlainDate,
  wanted: (row: BorrowerRow) => boolean = () => true,
): DemoBorrower[] {
  const latest = latestReportedQuarterEnd(seedDay);
  const calendar = quartersUpTo(latest);
  return BORROWER_ROWS.flatMap((row, index) =>
    wanted(row) ? demoBorrower(row, index, { seedDay, latest, calendar }) : [],
  );
}

export const LATE: readonly Scenario[] = ['late', 'late within grace'];

/** Behind the loans of hotels, a concession, and a works that nobody has had valued for long. */
const PROPERTIES: Readonly<Record<string, TradingPlan['property']>> = {
  'Pinevarra Resorts S.L.': { valueShare: 0.9, quartersBetweenValuations: 4, incomeShare: null },
  'Dunemorrel Hotels B.V.': { valueShare: 0.85, quartersBetweenValuations: 4, incomeShare: null },
  'Nordvelle Tramway Concession Ltd': { valueShare: 1.1, quartersBetweenValuations: 4, incomeShare: 0.25 },
  'Kaldermarrow Pressings Ltd': { valueShare: 1.1, quartersBetweenValuations: 20, incomeShare: null },
};

interface BookDays {
  readonly seedDay: PlainDate;
  /** The latest quarter end whose figures have arrived. */
  readonly latest: PlainDate;
  readonly calendar: readonly CalendarQuarter[];
}

function demoBorrower(
  row: BorrowerRow,
  index: number,
  { seedDay, latest, calendar }: BookDays,
): DemoBorrower {
  const random = randomNumbers(row.name);
  const profile = SECTOR_PROFILES[row.sector];
  const fiscalYearEndMonth = row.scenario === 'restated' || random.share() < 0.7 ? 12 : random.oneOf([3, 6]);
  const plan = plannedFor(
    row.scenario,
    {
      seed: row.name,
      calendar,
      fiscalYearEndMonth,
      profile,
      revenue: Math.round(random.between(7_000, 32_000)),
      growthPerYear: random.between(0, 0.06),
      termDebt: 0,
      juniorShare: random.share() < 0.2 ? 0.25 : 0,
      interestRate: random.between(0.052, 0.072),
      dividendShare: random.between(0.55, 0.9),
      openingCashShare: random.between(0.04, 0.08),
      property: PROPERTIES[row.name] ?? null,
      shape: ORDINARY,
    },
    random.between(0.9, 2.6),
  );
  const all = tradingYears(plan);
  const isLate = LATE.includes(row.scenario);
  const quarters = isLate ? all.slice(0, -1) : all;
  const firstTestIndex = random.count(7, 9);
  const usualDelayDays = random.count(24, 41);
  const deadline = deadlineOf(row, latest, seedDay);
  const rights = {
    scenario: row.scenario,
    quarters,
    firstTestIndex,
    dueDays: deadline.dueDays,
    asOf: businessDayBefore(seedDay),
  };
  return {
    name: row.name,
    scenario: row.scenario,
    legalForm: legalFormOf(row.name),
    lei: leiOf(row.name, index),
    isListed: row.name.endsWith(' plc'),
    sector: profile,
    country: row.country,
    currency: row.country === 'GB' ? 'GBP' : 'EUR',
    fiscalYearEndMonth,
    framework: row.name.endsWith(' plc') ? 'IFRS' : 'local GAAP',
    desk: row.desk,
    managerNumber: (index + 1) % 2,
    quarters,
    deliveries: deliveriesOf(row, quarters, fiscalYearEndMonth, usualDelayDays),
    owed: isLate ? (all.at(-1) ?? null) : null,
    usualDelayDays,
    facilities: facilitiesOf(quarters, firstTestIndex, random),
    covenants: withDemoRights(
      covenantsFor({
        scenario: row.scenario,
        quarters,
        firstTestIndex,
        nextQuarterEnd: quarterEndOnOrAfter(seedDay),
        random,
      }),
      rights,
    ),
    furtherCovenants: [
      ...furtherCovenants(row.name, { quarters, firstTestIndex, fiscalYearEndMonth }),
      ...springingCovenant(rights),
    ],
    ...deadline,
  };
}

function legalFormOf(name: string): DemoBorrower['legalForm'] {
  if (name.endsWith(' LLP')) return 'partnership';
  return name.includes('Concession') ? 'property or project vehicle' : 'company';
}

/** The prefix ZZ00 is given to nobody who issues identifiers. */
function leiOf(name: string, index: number): string {
  const stem = name
    .toUpperCase()
    .replaceAll(/[^A-Z]/g, '')
    .slice(0, 8);
  const first18 = `ZZ00${stem}${String(index + 1).padStart(5, '0')}U`;
  return `${first18}${leiCheckDigits(first18)}`;
}

/** The usual 45 days and 10 of grace; a late borrower's are such that they have passed, within grace or beyond. */
function deadlineOf(
  { scenario }: BorrowerRow,
  latest: PlainDate,
  seedDay: PlainDate,
): { dueDays: number; graceDays: number } {
  const daysSince = daysBetween(latest, businessDayBefore(seedDay));
  if (scenario === 'late within grace')
    return { dueDays: Math.floor((daysSince - 1) / 15) * 15, graceDays: 30 };
  return { dueDays: scenario === 'late' && daysSince <= 55 ? 30 : 45, graceDays: 10 };
}

function deliveriesOf(
  { name, scenario }: BorrowerRow,
  quarters: readonly DemoQuarter[],
  fiscalYearEndMonth: number,
  usualDelayDays: number,
): DemoDelivery[] {
  const delivery = (delivered: readonly DemoQuarter[]): DemoDelivery => {
    const last = delivered.at(-1);
    if (!last) throw new RangeError('a delivery requires at least one quarter');
    const stem = name.split(' ')[0] ?? name;
    return {
      fileName: `${stem} ${last.quarterEnd.slice(0, 7)}.xlsx`,
      quarters: delivered,
      receivedOn: addDays(last.quarterEnd, usualDelayDays),
    };
  };
  if (scenario !== 'restated') return [delivery(quarters)];
  const yearEnd = quarters.findLastIndex(
    ({ quarterEnd }, index) =>
      index < quarters.length - 1 && Number(quarterEnd.slice(5, 7)) === fiscalYearEndMonth,
  );
  const start = yearEnd - 3;
  return [
    delivery([...quarters.slice(0, start), ...asFirstReported(quarters.slice(start, yearEnd + 1))]),
    delivery(quarters.slice(start)),
  ];
}

const SECURITIES = [
  'Share pledge, assignment of receivables',
  'First-ranking mortgage, floating charge',
  'Debenture over all assets',
  'Pledge of machinery and stock',
] as const;

function facilitiesOf(
  quarters: readonly DemoQuarter[],
  firstTestIndex: number,
  random: RandomNumbers,
): DemoFacility[] {
  const [before, latest] = [quarters[firstTestIndex - 1], quarters.at(-1)];
  if (!before || !latest) throw new RangeError('a facility requires a quarter before its first test');
  const termOf = ({ lines }: DemoQuarter): number =>
    lines.short_term_debt - lines.revolver_drawn + lines.senior_debt;
  const startsOn = addDays(before.quarterEnd, -random.count(5, 70));
  const security = random.oneOf(SECURITIES);
  const marginBps = random.count(8, 17) * 25;
  const facilities: DemoFacility[] = [
    {
      name: 'Term loan A',
      kind: 'term loan',
      limit: Math.ceil(termOf(before) / 100) * 100,
      drawn: termOf(latest),
      marginBps,
      startsOn,
      maturesOn: addMonthsToMonthEnd(startsOn, 72),
      security,
    },
    {
      name: 'Revolving credit facility',
      kind: 'revolving credit',
      limit: latest.lines.revolver_commitment,
      drawn: latest.lines.revolver_drawn,
      marginBps: marginBps - 25,
      startsOn,
      maturesOn: addMonthsToMonthEnd(startsOn, 60),
      security,
    },
  ];
  return facilities.filter(({ limit }) => limit > 0);
}
