/** Which covenants a borrower of the demo desk agreed to, and at what levels. */
import { addDays, addMonthsToMonthEnd, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { MeasureCode } from '../../src/core/measures/measure.ts';
import { addBacksToReach } from './addBackPlans.ts';
import type { Scenario } from './borrowerTable.ts';
import type { DemoCovenant, DemoLevel } from './demoCovenant.ts';
import type { DemoQuarter } from './demoLines.ts';
import {
  headroomShare,
  levelWithRoom,
  schedule,
  scheduleEndingAt,
  withLaterStep,
  type LevelKind,
  type PastTest,
} from './levelSchedule.ts';
import { ordinaryLevels, type Usual } from './ordinaryLevels.ts';
import type { RandomNumbers } from './randomNumbers.ts';
import { currentRatio, interestCover, liquidity, netLeverage, totalLeverage } from './ratios.ts';

interface CovenantContext {
  readonly scenario: Scenario;
  /** Delivered quarters, oldest first. */
  readonly quarters: readonly DemoQuarter[];
  readonly firstTestIndex: number;
  /** First quarter end on or after the day the desk is laid out. */
  readonly nextQuarterEnd: PlainDate;
  readonly random: RandomNumbers;
}

type ReadingOf = (quarters: readonly DemoQuarter[], index: number) => number | null;

/** What every borrower of the book may have; the others are further covenants of a few. */
type OrdinaryMeasure = Extract<
  MeasureCode,
  'total-leverage' | 'net-leverage' | 'interest-cover' | 'current-ratio' | 'minimum-liquidity'
>;

const MEASURES: Readonly<
  Record<OrdinaryMeasure, { name: string; article: string; kind: LevelKind; usual: Usual; read: ReadingOf }>
> = {
  'total-leverage': {
    name: 'Total leverage',
    article: '(a)',
    kind: { isMaximum: true, step: 0.25 },
    usual: [2, 5.5],
    read: totalLeverage,
  },
  'net-leverage': {
    name: 'Net leverage',
    article: '(a)',
    kind: { isMaximum: true, step: 0.25 },
    usual: [2, 5.5],
    read: netLeverage,
  },
  'interest-cover': {
    name: 'Interest cover',
    article: '(b)',
    kind: { isMaximum: false, step: 0.25 },
    usual: [1.5, 4],
    read: interestCover,
  },
  'current-ratio': {
    name: 'Current ratio',
    article: '(c)',
    kind: { isMaximum: false, step: 0.05 },
    usual: [1, 1.5],
    read: currentRatio,
  },
  'minimum-liquidity': {
    name: 'Minimum liquidity',
    article: '(d)',
    kind: { isMaximum: false, step: 250 },
    usual: [250, 100_000],
    read: liquidity,
  },
};

/** Two to four covenants, the leverage covenant first. */
export function covenantsFor(context: CovenantContext): DemoCovenant[] {
  const { scenario, random } = context;
  const clause = random.oneOf(['20.2', '21.2', '22.3', '26.2']);
  const leverage = leverageMeasure(scenario, random);
  const others: OrdinaryMeasure[] = [];
  if (scenario !== 'ratio without meaning') others.push('interest-cover');
  const withCurrentRatio = scenario === 'thin current ratio' || random.share() < 0.4;
  const withLiquidity =
    scenario === 'thin liquidity' || scenario === 'ratio without meaning' || random.share() < 0.35;
  if (withCurrentRatio) others.push('current-ratio');
  if (withLiquidity) others.push('minimum-liquidity');
  return [leverage, ...others].map((measure) => covenantOn(measure, clause, context));
}

function leverageMeasure(scenario: Scenario, random: RandomNumbers): OrdinaryMeasure {
  if (scenario === 'ratio without meaning') return 'total-leverage';
  return scenario === 'healthy' && random.share() < 0.3 ? 'total-leverage' : 'net-leverage';
}

function covenantOn(measure: OrdinaryMeasure, clause: string, context: CovenantContext): DemoCovenant {
  const { scenario, quarters, firstTestIndex, random } = context;
  const { name, article, kind, read } = MEASURES[measure];
  const tests: PastTest[] = quarters.slice(firstTestIndex).map((quarter, offset) => ({
    date: quarter.quarterEnd,
    value: read(quarters, firstTestIndex + offset),
  }));
  const [first] = tests;
  if (!first) throw new RangeError('a covenant requires at least one past test');
  const rounds = random.share() < 0.25 && !STORIES_ON[measure].includes(scenario);
  const story = storyOf(measure, tests, context);
  return {
    name,
    clause: `${clause} ${article}`,
    measure,
    operator: kind.isMaximum ? (scenario === 'step-down later' ? '<' : '<=') : '>=',
    roundingPlaces: rounds && measure !== 'minimum-liquidity' ? 2 : null,
    firstTestOn: first.date,
    addBackCap: measure.endsWith('leverage') ? '0.25' : null,
    levels: story?.levels ?? ordinaryLevels(tests, MEASURES[measure], context),
    addBacks: story?.addBacks ?? [],
    waiver: story?.waiver ?? null,
  };
}

/** Which covenant carries which stories. */
const STORIES_ON: Readonly<Record<OrdinaryMeasure, readonly Scenario[]>> = {
  'total-leverage': ['ratio without meaning'],
  'net-leverage': [
    'thin headroom',
    'just passing on add-backs',
    'met only with add-backs',
    'not met and waived',
    'step-down ahead',
    'step-down later',
    'covenant holiday',
    'net cash',
  ],
  'interest-cover': ['interest cover not met'],
  'current-ratio': ['thin current ratio'],
  'minimum-liquidity': ['thin liquidity'],
};

type Story = Partial<Pick<DemoCovenant, 'levels' | 'addBacks' | 'waiver'>>;

/** Certified net leverage of the last five tests, in the band below 3.50. */
const JUST_PASSING = [3.47, 3.44, 3.46, 3.48, 3.465] as const;

function storyOf(
  measure: OrdinaryMeasure,
  tests: readonly PastTest[],
  context: CovenantContext,
): Story | null {
  const { scenario, quarters, nextQuarterEnd } = context;
  if (!STORIES_ON[measure].includes(scenario)) return null;
  const { kind } = MEASURES[measure];
  const last = quarters.length - 1;
  const endingAt = (level: number, storyTests = 1): DemoLevel[] =>
    scheduleEndingAt(level, tests, kind, storyTests);
  switch (scenario) {
    case 'thin headroom':
      return { levels: endingAt(3.5) };
    case 'just passing on add-backs': {
      const targets = new Map(JUST_PASSING.map((target, offset) => [last - 4 + offset, target]));
      const levels = withLaterStep(endingAt(3.5, JUST_PASSING.length), nextQuarterEnd, 3.25);
      return { levels, addBacks: addBacksToReach(quarters, targets) };
    }
    case 'met only with add-backs': {
      const targets = new Map([4, 3, 2, 1, 0].map((before) => [last - before, 3.08]));
      return { levels: endingAt(3.5, targets.size), addBacks: addBacksToReach(quarters, targets) };
    }
    case 'not met and waived':
      return { levels: endingAt(3.5), waiver: waiverOf(tests) };
    case 'step-down ahead':
      return { levels: withLaterStep(endingAt(3.5), nextQuarterEnd, 3) };
    case 'step-down later':
      return { levels: withLaterStep(endingAt(3.5), addMonthsToMonthEnd(nextQuarterEnd, 3), 3) };
    case 'covenant holiday':
      return { levels: withHoliday(ordinaryLevels(tests, MEASURES[measure], context), tests) };
    case 'net cash':
      return { levels: schedule([[tests[0]?.date ?? nextQuarterEnd, 2.5]]) };
    case 'ratio without meaning':
      return { levels: endingAt(3.5) };
    case 'interest cover not met':
      return { levels: endingAt(2.5) };
    default:
      return { levels: endingAt(levelJustBelow(tests, kind)) };
  }
}

/** The round level that leaves the latest test between 3 and 9 percent of room. */
function levelJustBelow(tests: readonly PastTest[], kind: LevelKind): number {
  const value = tests.at(-1)?.value ?? Number.NaN;
  const level = levelWithRoom([value], 0.045, kind);
  const room = headroomShare(value, level, kind);
  if (!(room > 0.03 && room < 0.1)) throw new Error(`no round level near ${value}: ${level} leaves ${room}`);
  return level;
}

/** No level in force on the third and fourth test. */
function withHoliday(levels: readonly DemoLevel[], tests: readonly PastTest[]): DemoLevel[] {
  const [third, fifth] = [tests[2], tests[4]];
  const [before] = levels;
  if (!third || !fifth || !before) throw new RangeError('a holiday requires five past tests');
  const steps: (readonly [PlainDate, number | null])[] = [
    [before.from, before.level],
    [third.date, null],
    ...levels.slice(1).map((row) => [row.from, row.level] as const),
  ];
  const resumed = levels.some((row) => row.from === fifth.date) ? [] : [[fifth.date, before.level] as const];
  return schedule([...steps, ...resumed].toSorted(([one], [other]) => (one < other ? -1 : 1)));
}

function waiverOf(tests: readonly PastTest[]): DemoCovenant['waiver'] {
  const latest = tests.at(-1);
  if (!latest) return null;
  return {
    testDate: latest.date,
    grantedOn: addDays(latest.date, 42),
    until: addMonthsToMonthEnd(latest.date, 6),
    conditions: 'Monthly management accounts; no dividend until the next test is met; fee of 0.25 % paid',
  };
}
