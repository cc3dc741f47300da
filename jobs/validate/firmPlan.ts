/** Who the firms of a simulated book are: their trade, their size, what befalls them, and which of them lift earnings. */
import { drawsOf, type Draws } from './draws.ts';
import { SECTORS, type SectorProfile } from './sectorProfiles.ts';

/** Quarters that are reported; the last is the one that is judged. */
export const QUARTERS = 24;
export const LAST = QUARTERS - 1;

export const CHANNELS = ['receivables', 'inventory', 'capitalised costs', 'mixed'] as const;
export type Channel = (typeof CHANNELS)[number];

export interface FirmPlan {
  readonly borrowerId: number;
  readonly sector: SectorProfile;
  readonly yearlyRevenue: number;
  readonly grossMargin: number;
  readonly overheads: number;
  readonly receivableDays: number;
  readonly inventoryDays: number;
  readonly payableDays: number;
  readonly ppe: number;
  /** Development that is capitalised in the ordinary course, share of revenue. */
  readonly development: number;
  readonly season: number;
  readonly peakQuarter: number;
  /** Of takeovers long past, over a year's revenue at the start. */
  readonly goodwill: number;
  /** Term debt over a year's EBITDA at the start. */
  readonly leverage: number;
  readonly yearlyGrowth: number;
  readonly fastGrowth: { readonly from: number; readonly yearly: number } | null;
  readonly acquisition: { readonly quarter: number; readonly size: number } | null;
  /** Each quarter from then on: revenue lost as a share, gross margin lost in points of revenue. */
  readonly distress: { readonly from: number; readonly revenue: number; readonly margin: number } | null;
  readonly isSeasonal: boolean;
  /** Customers pay later for good. */
  readonly latePayment: { readonly from: number; readonly up: number } | null;
  readonly developmentBurst: { readonly from: number; readonly until: number; readonly share: number } | null;
  /** Until the last quarter; `uplift` is the share of ordinary EBITDA that is added. */
  readonly lifting: { readonly from: number; readonly uplift: number; readonly channel: Channel } | null;
}

/** Of six hundred firms; methods.md B5. */
const COUNTS = { fast: 48, distressed: 90, acquirers: 48, seasonal: 90, latePaid: 48, bursts: 36 };
const LIFTERS = { distressed: 30, others: 30 };

export const firmPlans = (seed: number): readonly FirmPlan[] => {
  const sectors = SECTORS.flatMap((sector) => Array.from({ length: sector.firms }, () => sector));
  const roles = rolesOf(seed, sectors);
  return sectors.map((sector, place) => firmPlan(place + 1, sector, roles(place), drawsOf(seed, place + 1)));
};

interface Roles {
  readonly isFast: boolean;
  readonly isDistressed: boolean;
  readonly isAcquirer: boolean;
  readonly isSeasonal: boolean;
  readonly isPaidLate: boolean;
  readonly hasBurst: boolean;
  readonly lifts: boolean;
}

function rolesOf(seed: number, sectors: readonly SectorProfile[]): (place: number) => Roles {
  const draws = drawsOf(seed, 0);
  const everybody = draws.shuffled([...sectors.keys()]);
  const fast = new Set(everybody.slice(0, COUNTS.fast));
  const distressed = everybody.slice(COUNTS.fast, COUNTS.fast + COUNTS.distressed);
  const sound = everybody.filter((place) => !distressed.includes(place));
  const some = (from: readonly number[], count: number) => new Set(draws.shuffled(from).slice(0, count));
  const acquirers = some(sound, COUNTS.acquirers);
  const seasonal = some(everybody, COUNTS.seasonal);
  const latePaid = some(everybody, COUNTS.latePaid);
  const bursts = some(everybody, COUNTS.bursts);
  const lifters = new Set([...some(distressed, LIFTERS.distressed), ...some(sound, LIFTERS.others)]);
  return (place) => ({
    isFast: fast.has(place),
    isDistressed: distressed.includes(place),
    isAcquirer: acquirers.has(place),
    isSeasonal: seasonal.has(place),
    isPaidLate: latePaid.has(place),
    hasBurst: bursts.has(place),
    lifts: lifters.has(place),
  });
}

function firmPlan(borrowerId: number, sector: SectorProfile, roles: Roles, draws: Draws): FirmPlan {
  const margins = marginsOf(sector, draws);
  const varied = (value: number, deviation: number) => value * Math.exp(draws.normal(0, deviation));
  return {
    borrowerId,
    sector,
    yearlyRevenue: 30e6 * Math.exp(draws.normal(0, 0.9)),
    ...margins,
    receivableDays: varied(sector.receivableDays, 0.18),
    inventoryDays: varied(sector.inventoryDays, 0.22),
    payableDays: varied(sector.payableDays, 0.2),
    ppe: varied(sector.ppe, 0.25),
    development: draws.chance(sector.capitalising) ? varied(sector.development, 0.4) : 0,
    season: roles.isSeasonal ? draws.between(0.25, 0.6) : sector.season * draws.between(0.5, 1.3),
    peakQuarter: draws.whole(0, 3),
    goodwill: draws.chance(0.5) ? draws.between(0.1, 0.5) : 0,
    leverage: draws.between(1, 4.5),
    yearlyGrowth: draws.normal(0.04, 0.045),
    fastGrowth: roles.isFast ? { from: draws.whole(6, 14), yearly: draws.between(0.25, 0.55) } : null,
    acquisition: roles.isAcquirer
      ? { quarter: draws.whole(LAST - 7, LAST), size: draws.between(0.15, 0.5) }
      : null,
    distress: roles.isDistressed
      ? {
          from: draws.whole(LAST - 12, LAST - 2),
          revenue: draws.between(0.005, 0.03),
          margin: draws.between(0.004, 0.012),
        }
      : null,
    isSeasonal: roles.isSeasonal,
    latePayment: roles.isPaidLate ? { from: draws.whole(8, LAST), up: draws.between(0.1, 0.3) } : null,
    developmentBurst: roles.hasBurst ? burstOf(draws) : null,
    lifting: roles.lifts ? liftingOf(sector, draws) : null,
  };
}

/** Margins differ between firms of a trade, but none of them is built to lose money. */
function marginsOf(sector: SectorProfile, draws: Draws): { grossMargin: number; overheads: number } {
  const grossMargin = sector.grossMargin * Math.exp(draws.normal(0, 0.07));
  const overheads = sector.overheads * Math.exp(draws.normal(0, 0.07));
  return { grossMargin, overheads: Math.min(overheads, grossMargin - 0.04) };
}

function burstOf(draws: Draws): FirmPlan['developmentBurst'] {
  const from = draws.whole(LAST - 8, LAST - 1);
  return { from, until: from + draws.whole(4, 8), share: draws.between(0.01, 0.04) };
}

function liftingOf(sector: SectorProfile, draws: Draws): FirmPlan['lifting'] {
  const channel = CHANNELS[draws.whole(0, CHANNELS.length - 1)]!;
  const isWithoutStock = channel === 'inventory' && sector.inventoryDays === 0;
  return {
    from: LAST - draws.whole(1, 8),
    uplift: draws.between(0.15, 0.6),
    channel: isWithoutStock ? 'receivables' : channel,
  };
}
