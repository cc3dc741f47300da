/** The quarters that accrual noise is fitted on, read once for every quarter end that is looked at. */
import type { NoiseSeries, QuarterSeries } from '../accruals/accrualNoise.ts';
import { monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { accountsAt, ifAll, NOW, YEAR_AGO, type AccountsAt, type Back } from './accountsAt.ts';
import { mixesPresentations } from './cashFlowPresentation.ts';
import { QUALITY_TABLE } from './qualityTable.ts';

/** Each quarter less the same one a year before, over the average of both quarter ends' assets: seasons cancel. */
interface NoiseQuarter {
  readonly cashFlow: number | null;
  readonly workingCapitalChange: number | null;
  readonly revenueChange: number | null;
  readonly ppe: number | null;
}

const NOTHING: NoiseQuarter = { cashFlow: null, workingCapitalChange: null, revenueChange: null, ppe: null };

export type FullNoiseSeries = NoiseSeries & { readonly controls: NonNullable<NoiseSeries['controls']> };

/**
 * The series up to a quarter end, for as many quarters as can be usable and one before and after them. Quarters are
 * read once, whichever quarter end asks for them.
 *
 * A quarter whose accounts do not tie, or that would be held against one under another presentation of cash flows,
 * is a gap. Source: methods.md B1 item 5 and its note on quarters.
 *
 * @example noiseSeriesOf(book)('2026-09-30').cashFlow.length // => 18
 */
export function noiseSeriesOf(book: StatementBook): (quarterEnd: PlainDate) => FullNoiseSeries {
  const read = new Map<PlainDate, NoiseQuarter>();
  const quarterAt = (date: PlainDate): NoiseQuarter => {
    const known = read.get(date);
    if (known) return known;
    const quarter = noiseQuarter(book, date);
    read.set(date, quarter);
    return quarter;
  };
  return (quarterEnd) => {
    const count = QUALITY_TABLE.noiseQuarters + 2;
    const quarters = Array.from({ length: count }, (_, k) =>
      quarterAt(monthsBefore(quarterEnd, 3 * (count - 1 - k))),
    );
    const series = (name: keyof NoiseQuarter): QuarterSeries => quarters.map((quarter) => quarter[name]);
    return {
      cashFlow: series('cashFlow'),
      workingCapitalChange: series('workingCapitalChange'),
      controls: { revenueChange: series('revenueChange'), ppe: series('ppe') },
    };
  };
}

function noiseQuarter(book: StatementBook, quarterEnd: PlainDate): NoiseQuarter {
  const accounts = accountsAt(book, quarterEnd);
  if (!accounts.hasBalanceSheet(NOW) || !accounts.hasBalanceSheet(YEAR_AGO)) return NOTHING;
  const average = ifAll(
    { now: accounts.balance('total_assets'), yearAgo: accounts.balance('total_assets', YEAR_AGO) },
    ({ now, yearAgo }) => (now + yearAgo) / 2,
  );
  if (average === undefined || average <= 0) return NOTHING;
  const overYear = (read: (back: Back) => number | undefined): number | null =>
    ifAll({ now: read(NOW), yearAgo: read(YEAR_AGO) }, ({ now, yearAgo }) => (now - yearAgo) / average) ??
    null;
  const ppe = accounts.balance('ppe_gross') ?? accounts.balance('ppe_net');
  const quarter = {
    cashFlow: overYear((back) => accounts.quarter('cfo', back)),
    workingCapitalChange: overYear((back) => workingCapitalAccruals(accounts, back)),
    revenueChange: overYear((back) => accounts.quarter('revenue', back)),
    ppe: ppe === undefined ? null : ppe / average,
  };
  const used = accounts.used();
  return used.some(({ tie }) => tie === 'does-not-tie') || mixesPresentations(used) ? NOTHING : quarter;
}

/** By the cash flow statement, so that neither an acquisition nor a currency moves it: Hribar & Collins (2002). */
const workingCapitalAccruals = (accounts: AccountsAt, back: Back): number | undefined =>
  ifAll(
    {
      netIncome: accounts.quarter('net_income', back),
      depreciation: accounts.quarter('depreciation_and_amortisation', back),
      impairment: accounts.optionalQuarter('impairment', back),
      cfo: accounts.quarter('cfo', back),
    },
    ({ netIncome, depreciation, impairment, cfo }) => netIncome + depreciation + impairment - cfo,
  );
