/** Covenants of measures and definitions that only a few borrowers agreed to, each with room to spare. */
import { addDays, addMonthsToMonthEnd, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { MeasureCode } from '../../src/core/measures/measure.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import type { DemoAddBack, DemoCovenant } from './demoCovenant.ts';
import type { DemoQuarter } from './demoLines.ts';
import {
  annualisedLeverage,
  capexOfYear,
  debtServiceCover,
  debtYield,
  ebitdaOfYear,
  fixedChargeCover,
  frozenLeverage,
  gearing,
  leverageInEuro,
  leverageWithLeases,
  loanToValue,
  quickRatio,
  seniorLeverage,
  tangibleNetWorth,
  type ReadingOf,
} from './furtherRatios.ts';
import { levelWithRoom, schedule, type LevelKind } from './levelSchedule.ts';
import { netLeverage } from './ratios.ts';

interface Course {
  /** Delivered quarters, oldest first. */
  readonly quarters: readonly DemoQuarter[];
  readonly firstTestIndex: number;
  readonly fiscalYearEndMonth: number;
}

interface FurtherPlan {
  readonly measure: MeasureCode;
  readonly name: string;
  readonly clause: string;
  readonly kind: LevelKind;
  readonly read: ReadingOf;
  /** Share of the level that the tightest test leaves. */
  readonly room?: number;
  readonly firstTestIndex?: number;
  readonly terms?: Pick<DemoCovenant, 'definition' | 'facilityNumber' | 'currency'>;
  readonly addBacks?: (quarters: readonly DemoQuarter[]) => DemoAddBack[];
}

const MOST_TIMES: LevelKind = { isMaximum: true, step: 0.25 };
const LEAST_TIMES: LevelKind = { isMaximum: false, step: 0.05 };
const LEAST_THOUSANDS: LevelKind = { isMaximum: false, step: 250 };
const LAST_THREE_TESTS = 15;
const SECOND_FACILITY = { facilityNumber: 1 } as const;

const debtService = { measure: 'debt-service-cover', name: 'Debt service cover', kind: LEAST_TIMES } as const;
const valued = {
  measure: 'loan-to-value',
  name: 'Loan to value',
  kind: { isMaximum: true, step: 0.05 },
  read: loanToValue,
} as const;

const PLANS: Readonly<Record<string, readonly FurtherPlan[]>> = {
  'Brenningsund Forge Oy': [
    {
      measure: 'senior-leverage',
      name: 'Senior leverage',
      clause: '21.2 (e)',
      kind: MOST_TIMES,
      read: seniorLeverage,
    },
    { ...debtService, clause: '21.2 (f)', read: debtServiceCover, room: 0.4 },
  ],
  'Kaldermarrow Pressings Ltd': [
    { ...valued, clause: '22.3 (e)', terms: { definition: { valuationMaxAgeMonths: 24 } } },
  ],
  'Tervanholt Guss GmbH': [
    {
      measure: 'fixed-charge-cover',
      name: 'Fixed-charge cover',
      clause: '20.2 (e)',
      kind: LEAST_TIMES,
      read: fixedChargeCover,
      room: 0.35,
    },
  ],
  'Sundrelle Profils SAS': [
    { measure: 'quick-ratio', name: 'Quick ratio', clause: '26.2 (e)', kind: LEAST_TIMES, read: quickRatio },
    {
      measure: 'minimum-ebitda',
      name: 'Minimum EBITDA',
      clause: '26.2 (f)',
      kind: LEAST_THOUSANDS,
      read: ebitdaOfYear,
    },
  ],
  'Pelligrande Traitements SAS': [
    {
      measure: 'gearing',
      name: 'Gearing',
      clause: '20.2 (e)',
      kind: { isMaximum: true, step: 0.05 },
      read: gearing,
      terms: { definition: { gearing: 'debt to capital' } },
    },
  ],
  'Otterbrane Wholesale Ltd': [
    {
      measure: 'net-leverage',
      name: 'Net leverage, rules at signing',
      clause: '24.1 (a)',
      kind: MOST_TIMES,
      read: frozenLeverage,
      terms: { ...SECOND_FACILITY, definition: { accounting: 'frozen' } },
    },
  ],
  'Halvorune Building Supplies Oy': [
    {
      measure: 'net-leverage',
      name: 'Net leverage with leases',
      clause: '24.1 (a)',
      kind: MOST_TIMES,
      read: leverageWithLeases(2_000),
      terms: {
        ...SECOND_FACILITY,
        definition: { leasesInDebt: true, cashNettingCap: decimal(2_000_000) },
      },
    },
  ],
  'Merrinstowe Catering Supply Ltd': [
    {
      measure: 'net-leverage',
      name: 'Net leverage in euro',
      clause: '24.1 (a)',
      kind: MOST_TIMES,
      read: leverageInEuro,
      terms: { ...SECOND_FACILITY, currency: 'EUR' },
    },
  ],
  'Norvaquel Elektro GmbH': [
    {
      measure: 'net-leverage',
      name: 'Net leverage of the revolver',
      clause: '24.1 (a)',
      kind: MOST_TIMES,
      // Without the add-backs: what they bring comes on top.
      read: netLeverage,
      terms: {
        ...SECOND_FACILITY,
        definition: {
          addBackCap: decimal('0.2'),
          addBackCapBasis: 'after',
          impairmentAddedBack: true,
        },
      },
      addBacks: beyondTheirCap,
    },
  ],
  'Rastevolde Parts B.V.': [
    {
      measure: 'net-leverage',
      name: 'Net leverage of the revolver',
      clause: '24.1 (a)',
      kind: MOST_TIMES,
      read: annualisedLeverage(LAST_THREE_TESTS),
      firstTestIndex: LAST_THREE_TESTS,
      terms: { ...SECOND_FACILITY, definition: { annualisedFirstTests: 3 } },
    },
  ],
  'Cindrevall Conveyors Ltd': [
    {
      measure: 'tangible-net-worth',
      name: 'Tangible net worth',
      clause: '21.2 (e)',
      kind: LEAST_THOUSANDS,
      read: tangibleNetWorth,
      room: 1.2,
      terms: { definition: { profitShareInNetWorth: decimal('0.25') } },
    },
  ],
  'Dairenholme Cheese B.V.': [
    {
      ...debtService,
      clause: '22.3 (e)',
      // Opening cash comes on top.
      read: debtServiceCover,
      room: 0.4,
      terms: { definition: { openingCashInDebtService: true } },
    },
  ],
  'Nordvelle Tramway Concession Ltd': [
    { ...valued, clause: '26.2 (e)', terms: { definition: { valuationMaxAgeMonths: 18 } } },
    {
      measure: 'debt-yield',
      name: 'Debt yield',
      clause: '26.2 (f)',
      kind: { isMaximum: false, step: 0.01 },
      read: debtYield,
    },
  ],
  'Pinevarra Resorts S.L.': [
    { ...valued, clause: '20.2 (e)', terms: { definition: { valuationMaxAgeMonths: 18 } } },
  ],
  'Dunemorrel Hotels B.V.': [
    { ...valued, clause: '22.3 (e)', terms: { definition: { valuationMaxAgeMonths: 12 } } },
  ],
};

const WITH_CAPEX_LIMIT = 'Tervanholt Guss GmbH';

/** Beyond the two to four that every borrower has. */
export const furtherCovenants = (name: string, course: Course): DemoCovenant[] => [
  ...(PLANS[name] ?? []).map((plan) => covenantOf(plan, course)),
  ...(name === WITH_CAPEX_LIMIT ? [capexLimit(course)] : []),
];

function covenantOf(plan: FurtherPlan, { quarters, firstTestIndex }: Course): DemoCovenant {
  const start = plan.firstTestIndex ?? firstTestIndex;
  const values = quarters
    .map((_, index) => (index < start ? null : plan.read(quarters, index)))
    .filter((value) => value !== null);
  const first = quarters[start];
  if (!first) throw new RangeError('a covenant requires at least one past test');
  return {
    name: plan.name,
    clause: plan.clause,
    measure: plan.measure,
    operator: plan.kind.isMaximum ? '<=' : '>=',
    roundingPlaces: null,
    firstTestOn: first.quarterEnd,
    addBackCap: null,
    levels: schedule([[first.quarterEnd, levelWithRoom(values, plan.room ?? 0.22, plan.kind)]]),
    addBacks: plan.addBacks?.(quarters) ?? [],
    waiver: null,
    ...plan.terms,
  };
}

/** Add-backs of the last four quarters that come to a third of EBITDA: a fifth of it with them is the most. */
function beyondTheirCap(quarters: readonly DemoQuarter[]): DemoAddBack[] {
  return quarters.slice(-4).map((quarter, index) => ({
    periodEnd: quarter.quarterEnd,
    label: index % 2 === 0 ? 'Move of the warehouse' : 'Double rent during the move',
    amount: Math.round((ebitdaOfYear(quarters, quarters.length - 1) ?? 0) / 12),
    capped: true,
    reason: 'Two warehouses were run side by side until the new one took over',
    evidence: 'Certificate, schedule 3',
  }));
}

/** Tested at every year end; last year spent more than its own limit and lives on what the year before left. */
function capexLimit({ quarters, firstTestIndex, fiscalYearEndMonth }: Course): DemoCovenant {
  const yearEnds = quarters.flatMap(({ quarterEnd }, index) =>
    index >= firstTestIndex && Number(quarterEnd.slice(5, 7)) === fiscalYearEndMonth
      ? [{ quarterEnd, spent: capexOfYear(quarters, index) }]
      : [],
  );
  const [first] = yearEnds;
  if (!first) throw new RangeError('a limit of capital expenditure requires a year end');
  const inSteps = (amount: number): number => Math.round(amount / 50) * 50;
  const limits = yearEnds.map(({ quarterEnd, spent }, index): [PlainDate, number] => [
    firstDayOf(quarterEnd),
    inSteps(spent * (index === yearEnds.length - 1 && index > 0 ? 0.95 : 1.5)),
  ]);
  const last = yearEnds.at(-1) ?? first;
  return {
    name: 'Capital expenditure',
    clause: '20.2 (f)',
    measure: 'capital-expenditure',
    operator: '<=',
    roundingPlaces: null,
    firstTestOn: first.quarterEnd,
    everyMonths: 12,
    addBackCap: null,
    levels: schedule([...limits, [addDays(last.quarterEnd, 1), inSteps(last.spent * 1.3)]]),
    addBacks: [],
    waiver: null,
    definition: { capexCarriedShare: decimal('0.5') },
  };
}

const firstDayOf = (yearEnd: PlainDate): PlainDate => addDays(addMonthsToMonthEnd(yearEnd, -12), 1);
