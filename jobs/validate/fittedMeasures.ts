/** Published measures that are residuals among peers: the Jones family and real activities. */
import { jonesModel, type JonesFirm, type JonesModel } from '#core/accruals/jones.ts';
import { realActivities, type RealActivitiesFirm } from '#core/accruals/realActivities.ts';
import { clamp, winsorLimits } from '#core/statistics/winsorise.ts';
import { totalAssetsOf } from './statements.ts';
import { firmYear, type FirmYear } from './firmYear.ts';
import type { Measured } from './ownMeasures.ts';
import type { Firm } from './statementBook.ts';

/** A sector of fewer firms is fitted with the whole book. */
const FEWEST_FIRMS = 15;
/** Each variable is drawn in at the 1st and 99th percentile of the book, as users of these models do. */
const WINSOR_TAIL = 0.01;

const JONES_LABELS: Readonly<Record<Exclude<JonesModel, 'with-cash-flow'>, string>> = {
  'jones-1991': 'Jones residual',
  'jones-constant': 'Jones residual, constant',
  'modified-1995': 'modified Jones residual',
  'modified-constant': 'modified Jones residual, constant',
  kothari: 'Kothari residual',
};

interface Years {
  readonly year: FirmYear;
  readonly before: FirmYear;
}

/** One record per firm, in their order. */
export function fittedMeasures(firms: readonly Firm[], quarter: number): readonly Measured[] {
  const years = firms.map(({ quarters }) => ({
    year: firmYear(quarters, quarter),
    before: firmYear(quarters, quarter - 4),
  }));
  const jones = drawnIn(years.map(jonesFirm), 'lagAssets', ['priorReturnOnAssets']);
  const real = drawnIn(
    firms.map((firm, k) => realActivitiesFirm(firm, quarter, years[k]!)),
    'lagAssets',
    [],
  );
  const sectors = firms.map(({ plan }) => plan.sector.name);
  const measured: Record<string, number | null>[] = firms.map(() => ({}));
  const keep = (label: string, residuals: readonly (number | null)[]): void =>
    residuals.forEach((residual, k) => (measured[k]![label] = residual));
  for (const [model, label] of Object.entries(JONES_LABELS))
    keep(
      label,
      residualsBySector(sectors, (members) => {
        const fit = jonesModel(
          model as JonesModel,
          members.map((k) => jones[k]!),
        );
        return fit.ok ? fit.value.residuals : null;
      }),
    );
  const activities = (read: 'cashFlow' | 'production' | 'discretionary', sign: 1 | -1) =>
    residualsBySector(sectors, (members) => {
      const fit = realActivities(members.map((k) => real[k]!));
      return fit.ok ? fit.value[read].residuals.map((residual) => sign * residual) : null;
    });
  const parts = [activities('cashFlow', -1), activities('production', 1), activities('discretionary', -1)];
  keep('abnormal cash flow, low', parts[0]!);
  keep('abnormal production cost', parts[1]!);
  keep('abnormal discretionary cost, low', parts[2]!);
  keep(
    'real activities, sum',
    firms.map((_, k) => parts.reduce<number | null>((sum, part) => add(sum, part[k]!), 0)),
  );
  return measured;
}

const add = (one: number | null, other: number | null): number | null =>
  one === null || other === null ? null : one + other;

function residualsBySector(
  sectors: readonly string[],
  fit: (members: readonly number[]) => readonly number[] | null,
): readonly (number | null)[] {
  const everybody = [...sectors.keys()];
  const residuals = new Array<number | null>(sectors.length).fill(null);
  const place = (
    members: readonly number[],
    fitted: readonly number[] | null,
    wanted: readonly number[],
  ): void => wanted.forEach((k) => (residuals[k] = fitted?.[members.indexOf(k)] ?? null));
  for (const sector of new Set(sectors)) {
    const members = everybody.filter((k) => sectors[k] === sector);
    const peers = members.length < FEWEST_FIRMS ? everybody : members;
    place(peers, fit(peers), members);
  }
  return residuals;
}

function jonesFirm({ year, before }: Years): JonesFirm {
  const { flows, opening, closing } = year;
  return {
    lagAssets: totalAssetsOf(opening),
    totalAccruals: flows.netIncome - flows.cfo,
    revenueChange: flows.revenue - before.flows.revenue,
    receivablesChange: closing.receivables - opening.receivables,
    ppeGross: closing.ppeGross,
    priorReturnOnAssets: before.flows.netIncome / totalAssetsOf(before.opening),
    cashFromOperations: flows.cfo,
  };
}

function realActivitiesFirm(
  { quarters }: Firm,
  quarter: number,
  { year, before }: Years,
): RealActivitiesFirm {
  const { flows, opening, closing } = year;
  return {
    lagAssets: totalAssetsOf(opening),
    sales: flows.revenue,
    salesChange: flows.revenue - before.flows.revenue,
    salesChangePrior: before.flows.revenue - firmYear(quarters, quarter - 8).flows.revenue,
    cashFromOperations: flows.cfo,
    productionCosts: flows.costOfSales + closing.inventory - opening.inventory,
    discretionaryExpenses: flows.overheads,
  };
}

/** Every amount over the scale drawn in at the tails of the book, then put back into units; `ratios` have no scale. */
function drawnIn<Firm extends object>(
  firms: readonly Firm[],
  scale: keyof Firm,
  ratios: readonly (keyof Firm)[],
): readonly Firm[] {
  const names = (Object.keys(firms[0]!) as (keyof Firm)[]).filter((name) => name !== scale);
  const scaleOf = (firm: Firm, name: keyof Firm): number => (ratios.includes(name) ? 1 : Number(firm[scale]));
  const limits = names.map((name) =>
    winsorLimits(
      firms.map((firm) => Number(firm[name]) / scaleOf(firm, name)),
      WINSOR_TAIL,
    ),
  );
  return firms.map((firm) => ({
    ...firm,
    ...Object.fromEntries(
      names.map((name, k) => [
        name,
        clamp(Number(firm[name]) / scaleOf(firm, name), limits[k]!) * scaleOf(firm, name),
      ]),
    ),
  }));
}
