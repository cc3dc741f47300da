/** Limits and minima that an agreement computes itself: methods.md A3 and A6. */
import { lastYearEndBefore } from '../calendar/fiscalYear.ts';
import { addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import { formatShareLevel } from '../money/print.ts';
import { Decimal, ZERO } from '../money/decimal.ts';
import type { BridgeLine } from '../measures/bridge.ts';
import { capitalExpenditureIn } from '../measures/charges.ts';
import type { MeasureRequest } from '../measures/definition.ts';
import { flowIn } from '../measures/readLines.ts';
import type { Reading } from '../statements/reading.ts';
import type { Covenant } from './covenant.ts';
import { levelInForce, type LevelInForce } from './levels.ts';

/**
 * The limit of capital expenditure: the year's own, used first, and a share of what last year left unused.
 *
 * @example capexLimit({ ownYear: decimal(10), unusedLastYear: decimal(4), carriedShare: decimal('0.5') }) // => 12
 *
 * @public the method pages compute their examples with it
 */
export const capexLimit = ({
  ownYear,
  unusedLastYear,
  carriedShare,
}: {
  readonly ownYear: Decimal;
  readonly unusedLastYear: Decimal;
  readonly carriedShare: Decimal;
}): Decimal => ownYear.plus(unusedLastYear.times(carriedShare));

/**
 * A minimum that rises with a share of every year's profit and does not fall with losses.
 *
 * @example minimumWithProfits({ base: decimal(40), share: decimal('0.5'), netIncomes: [decimal(6), decimal(-3)] }) // => 43
 *
 * @public the method pages compute their examples with it
 */
export const minimumWithProfits = ({
  base,
  share,
  netIncomes,
}: {
  readonly base: Decimal;
  readonly share: Decimal;
  readonly netIncomes: readonly Decimal[];
}): Decimal => base.plus(Decimal.sum(0, ...netIncomes.map((income) => Decimal.max(0, income))).times(share));

/** A level as the agreement computes it, with what it was computed from. */
export interface AgreedLevel {
  readonly level: Decimal;
  readonly bridge: readonly BridgeLine[];
  /** Figures without which the level is not known. */
  readonly behind: readonly Reading[];
}

type RowInForce = Extract<LevelInForce, { kind: 'level' }>;

/**
 * The level of a test date: that of the schedule, raised by what capital expenditure may carry over from last year,
 * or by the share of profits that a minimum net worth takes up. Where a figure behind it is missing the schedule's
 * own level stands and the gap is among `behind`.
 *
 * @example agreedLevelOf(covenant, request, { kind: 'level', level: decimal('3.5') }).level // => 3.5
 */
export function agreedLevelOf(
  covenant: Pick<Covenant, 'measure' | 'levels'>,
  request: MeasureRequest,
  { level }: RowInForce,
): AgreedLevel {
  const { capexCarriedShare, profitShareInNetWorth } = request.definition;
  if (covenant.measure === 'capital-expenditure' && capexCarriedShare !== null)
    return withCarryOver(covenant, request, { level, carriedShare: capexCarriedShare });
  if (covenant.measure === 'tangible-net-worth' && profitShareInNetWorth !== null)
    return withProfits(covenant, request, { level, share: profitShareInNetWorth });
  return { level, bridge: [], behind: [] };
}

/** The year's own limit is used first, so that what was carried over once is not carried on. */
function withCarryOver(
  { levels }: Pick<Covenant, 'levels'>,
  request: MeasureRequest,
  { level, carriedShare }: { readonly level: Decimal; readonly carriedShare: Decimal },
): AgreedLevel {
  const lastYear = lastYearEndBefore(request.date, request.book.fiscalYearEndMonth);
  const before = levelInForce(levels, lastYear);
  if (before.kind !== 'level') return { level, bridge: [], behind: [] };
  const { reading: spent } = capitalExpenditureIn({ ...request, date: lastYear, months: 12 });
  if (spent.kind !== 'value') return { level, bridge: [], behind: [spent] };
  const unusedLastYear = Decimal.max(ZERO, before.level.minus(spent.value));
  const limit = capexLimit({ ownYear: level, unusedLastYear, carriedShare });
  return {
    level: limit,
    behind: [spent],
    bridge: [
      figure('Limit of the year', level),
      {
        ...figure(`Carried over from the year to ${formatDay(lastYear)}`, limit.minus(level)),
        inputs: spent.inputs,
        note: `${formatShareLevel(carriedShare)} of what that year left unused`,
      },
      { label: 'Limit with carry-over', amount: limit, kind: 'subtotal', inputs: [] },
    ],
  };
}

/** Profits of the financial years that ended since the row in force began; a new row agrees a new base. */
function withProfits(
  { levels }: Pick<Covenant, 'levels'>,
  request: MeasureRequest,
  { level, share }: { readonly level: Decimal; readonly share: Decimal },
): AgreedLevel {
  const { date, book } = request;
  const years = yearEndsBetween(beginningOfRow(levels, date), date, book.fiscalYearEndMonth);
  const behind = years.map((end) => flowIn({ ...request, date: end, months: 12 }, 'net_income'));
  const netIncomes = behind.flatMap((reading) => (reading.kind === 'value' ? [reading.value] : []));
  if (netIncomes.length < behind.length || netIncomes.length === 0) return { level, bridge: [], behind };
  const minimum = minimumWithProfits({ base: level, share, netIncomes });
  return {
    level: minimum,
    behind,
    bridge: [
      figure('Minimum of the schedule', level),
      ...behind.flatMap((reading, at): BridgeLine[] => {
        const end = years[at];
        if (reading.kind !== 'value' || !end) return [];
        const raised = Decimal.max(ZERO, reading.value).times(share);
        return [
          {
            ...figure(`Share of the profit of the year to ${formatDay(end)}`, raised),
            inputs: reading.inputs,
            note: `${formatShareLevel(share)}; a loss takes nothing away`,
          },
        ];
      }),
      { label: 'Minimum with profits', amount: minimum, kind: 'subtotal', inputs: [] },
    ],
  };
}

/** The day from which the row in force holds; of rows that overlap, the one that begins later. */
const beginningOfRow = (levels: Covenant['levels'], date: PlainDate): PlainDate =>
  levels.reduce<PlainDate | null>(
    (latest, { from, until }) =>
      from <= date && (until === null || date <= until) && (latest === null || from > latest) ? from : latest,
    null,
  ) ?? date;

/** Year ends after one day, up to and including another, oldest first. */
function yearEndsBetween(
  after: PlainDate,
  until: PlainDate,
  fiscalYearEndMonth: number,
): readonly PlainDate[] {
  const ends: PlainDate[] = [];
  const first = addMonthsToMonthEnd(lastYearEndBefore(after, fiscalYearEndMonth), 12);
  for (let end = first; end <= until; end = addMonthsToMonthEnd(end, 12)) if (end > after) ends.push(end);
  return ends;
}

const figure = (label: string, amount: Decimal): BridgeLine => ({
  label,
  amount,
  kind: 'figure',
  inputs: [],
});
