/** Borrowers whose agreements' rights are in use: a cure period, money of the owners, a deemed cure, springing, our own triggers. */
import { daysOn, dueDate } from '../../src/core/calendar/deadline.ts';
import { addDays, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { Scenario } from './borrowerTable.ts';
import type { DemoCovenant, DemoCureRights } from './demoCovenant.ts';
import type { DemoQuarter } from './demoLines.ts';
import { levelWithRoom, schedule, type LevelKind } from './levelSchedule.ts';
import { netDebt, netLeverage, yearEbitda } from './ratios.ts';

interface RightsContext {
  readonly scenario: Scenario;
  /** Delivered quarters, oldest first. */
  readonly quarters: readonly DemoQuarter[];
  readonly firstTestIndex: number;
  readonly dueDays: number;
  /** The day that the first night is for. */
  readonly asOf: PlainDate;
}

const TIMES: LevelKind = { isMaximum: true, step: 0.25 };
const FINE_STEP = 0.05;
/** Share by which the story's test misses its level, at least. */
const MISSED_BY = 0.04;
const ROOM = 0.25;

const USUAL_RIGHTS: DemoCureRights = {
  method: 'ebitda',
  withinBusinessDays: 15,
  mostInFour: 2,
  mostInLife: 5,
  curedByNextTest: false,
};

/** The covenants with the story's rights on the leverage covenant, which stands first; others are left as they are. */
export function withDemoRights(covenants: readonly DemoCovenant[], context: RightsContext): DemoCovenant[] {
  const [leverage, ...others] = covenants;
  if (!leverage) return [];
  switch (context.scenario) {
    case 'in cure period': {
      const levels = steppedDownTo(context, 0);
      const withinBusinessDays = daysStillOpen(context);
      return [{ ...leverage, levels, cureRights: { ...USUAL_RIGHTS, withinBusinessDays } }, ...others];
    }
    case 'cured by its owners':
      return [{ ...leverage, ...curedByOwners(context) }, ...others];
    case 'cured by the next test':
      return [
        {
          ...leverage,
          levels: steppedDownTo(context, 1),
          cureRights: { ...USUAL_RIGHTS, curedByNextTest: true },
        },
        ...others,
      ];
    case 'our own triggers':
      return [{ ...leverage, levels: steppedDownTo(context, 0) }, ...others].map((covenant) => ({
        ...covenant,
        clause: 'none',
        isOurs: true as const,
      }));
    default:
      return [...covenants];
  }
}

/** A leverage covenant for the revolver's lenders, tested only above a share of drawings that the latest is not above. */
export function springingCovenant({ scenario, quarters, firstTestIndex }: RightsContext): DemoCovenant[] {
  const [first, latest] = [quarters[firstTestIndex], quarters.at(-1)];
  if (scenario !== 'springing revolver' || !first || !latest) return [];
  const drawn = latest.lines.revolver_drawn / latest.lines.revolver_commitment;
  const trigger = Math.max(0.35, Math.ceil(drawn / FINE_STEP + 1) * FINE_STEP);
  return [
    {
      name: 'Net leverage, springing',
      clause: '24.1 (a)',
      measure: 'net-leverage',
      operator: '<=',
      roundingPlaces: null,
      firstTestOn: first.quarterEnd,
      addBackCap: null,
      facilityNumber: 1,
      springingTrigger: trigger.toFixed(2),
      levels: schedule([[first.quarterEnd, roomyLevel(readings(quarters, firstTestIndex))]]),
      addBacks: [],
      waiver: null,
    },
  ];
}

const readings = (quarters: readonly DemoQuarter[], from: number): number[] =>
  quarters.flatMap((_, index) => (index < from ? [] : (netLeverage(quarters, index) ?? [])));

const roomyLevel = (values: readonly number[]): number => levelWithRoom(values, ROOM, TIMES);

/** The tightest round level that the reading misses by the story's share. */
const missedLevel = (value: number): number =>
  Number((Math.floor(value / (1 + MISSED_BY) / FINE_STEP + 1e-9) * FINE_STEP).toFixed(2));

/** Room until the story's test, which a step-down makes it miss; where it was an earlier one, the next test's level is a reset. */
function steppedDownTo(
  { quarters, firstTestIndex }: RightsContext,
  testsBefore: number,
): DemoCovenant['levels'] {
  const at = quarters.length - 1 - testsBefore;
  const [first, missed, next] = [quarters[firstTestIndex], quarters[at], quarters[at + 1]];
  const value = netLeverage(quarters, at);
  if (!first || !missed || value === null) throw new RangeError('a story of rights requires past tests');
  const roomy = roomyLevel(readings(quarters, firstTestIndex));
  const levels = schedule([
    [first.quarterEnd, roomy],
    [missed.quarterEnd, missedLevel(value)],
    ...(next ? [[next.quarterEnd, roomy] as const] : []),
  ]);
  return levels.map((row) => (row.from === next?.quarterEnd ? { ...row, isReset: true as const } : row));
}

/** As many business days, in fives, as leave some of them on the first night. */
function daysStillOpen({ quarters, dueDays, asOf }: RightsContext): number {
  const latest = quarters.at(-1);
  if (!latest) throw new RangeError('a cure period requires a past test');
  const due = dueDate({ periodEnd: latest.quarterEnd, days: dueDays, dayCount: 'calendar' });
  let days = USUAL_RIGHTS.withinBusinessDays;
  while (daysOn(due, days, 'business') < addDays(asOf, 3)) days += 5;
  return days;
}

const DAYS_UNTIL_MONEY = 47;
const IN_STEPS_OF = 50;

/** What the latest test lacks as EBITDA, rounded up, where it has come in by the first night. */
function curedByOwners(context: RightsContext): Pick<DemoCovenant, 'levels' | 'cureRights' | 'cures'> {
  const { quarters, asOf } = context;
  const levels = steppedDownTo(context, 0);
  const [latest, level] = [quarters.at(-1), levels.at(-1)?.level];
  const ebitda = yearEbitda(quarters, quarters.length - 1);
  if (!latest || !level || ebitda === null) throw new RangeError('a cure requires a level and earnings');
  const amount = Math.ceil((netDebt(latest) / level - ebitda) / IN_STEPS_OF) * IN_STEPS_OF;
  const receivedOn = addDays(latest.quarterEnd, DAYS_UNTIL_MONEY);
  const money = { quarterEnd: latest.quarterEnd, method: USUAL_RIGHTS.method, amount, receivedOn };
  return { levels, cureRights: USUAL_RIGHTS, cures: receivedOn <= asOf ? [money] : [] };
}
