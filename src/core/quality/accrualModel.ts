/** The wide accrual model fitted per sector where there are firms enough, else over the whole book. */
import { accrualTerms, type AccrualTerms } from '../accruals/unexplainedAccruals.ts';
import { leastSquares } from '../statistics/leastSquares.ts';
import { linearPercentile } from '../statistics/percentile.ts';
import { clamp, winsorLimits, type WinsorLimits } from '../statistics/winsorise.ts';
import { bySector } from './bySector.ts';
import { figuresOf } from './comparedFigures.ts';
import type { PeerInputs } from './peerFigures.ts';

/** Ten firms and six degrees of freedom beside five terms. */
const FEWEST_FIRMS = 11;
/** Firms of a small sector that would count half against none. */
const SECTOR_SHRINKAGE_FIRMS = 10;
const WINSOR_TAIL = 0.01;

/** Property, plant and equipment: gross, or net for every firm of a group in which one gives no gross. */
type PpeBasis = 'ppeGross' | 'ppeNet';
const LIMITED = ['accruals', 'reciprocalAssets', 'revenueChange', 'cashFlow', 'ppeGross', 'ppeNet'] as const;
type Limited = (typeof LIMITED)[number];

interface Fit {
  /** Constant, 1/A, revenue change, property plant and equipment, cash flow. */
  readonly coefficients: readonly number[];
  readonly ppe: PpeBasis;
}

export interface AccrualModel {
  readonly limits: Readonly<Record<Limited, WinsorLimits | null>>;
  readonly pooled: Fit | null;
  readonly sectors: readonly SectorModel[];
}

/** A sector's own fit, or what its firms differ by from the book's slopes, drawn towards nothing where they are few. */
type SectorModel =
  | { readonly sector: string; readonly firms: number; readonly own: Fit }
  | { readonly sector: string; readonly firms: number; readonly shift: number };

interface Row extends AccrualTerms {
  readonly sector: string;
  readonly ppeGross: number | null;
  readonly ppeNet: number | null;
}

/**
 * The model at one quarter end. Response and regressors are drawn in at the 1st and 99th percentile of the book for
 * fitting. Null where no firm has the figures.
 *
 * Source: methods.md B6.
 *
 * @example accrualModelFor([]) // => null
 */
export function accrualModelFor(peers: readonly PeerInputs[]): AccrualModel | null {
  const rows = peers.flatMap((peer) => rowOf(peer) ?? []);
  if (rows.length === 0) return null;
  const limits = Object.fromEntries(LIMITED.map((name) => [name, limitsOf(rows, name)])) as Record<
    Limited,
    WinsorLimits | null
  >;
  const pooled = fit(rows, limits);
  const sectors = [...bySector(rows)].map(([sector, own]): SectorModel => {
    const fitted = fit(own, limits);
    if (fitted) return { sector, firms: own.length, own: fitted };
    return { sector, firms: own.length, shift: pooled ? shiftOf(own, pooled, limits) : 0 };
  });
  return { limits, pooled, sectors };
}

/**
 * A borrower's accruals that the model does not explain, as a share of last year's assets; its own figures as they
 * are against the drawn-in regressors. Null where a term is missing or nothing could be fitted.
 *
 * @example unexplainedAccruals(null, peer) // => null
 */
export function unexplainedAccruals(model: AccrualModel | null, peer: PeerInputs): number | null {
  const row = rowOf(peer);
  if (!row || !model) return null;
  const sector = model.sectors.find((each) => each.sector === row.sector);
  if (sector && 'own' in sector) return residual(row, sector.own, model.limits);
  if (!model.pooled) return null;
  const raw = residual(row, model.pooled, model.limits);
  return raw === null ? null : raw - (sector?.shift ?? 0);
}

function rowOf(peer: PeerInputs): Row | null {
  const given = figuresOf(peer.figures, [
    'assetsPrior',
    'netIncome',
    'impairmentAfterTax',
    'cfo',
    'capex',
    'capitalisedCosts',
    'revenue',
    'revenuePrior',
  ]);
  const terms = given && accrualTerms(given);
  if (!given || !terms) return null;
  const { ppeGross, ppeNet } = peer.figures;
  if (ppeGross === undefined && ppeNet === undefined) return null;
  return {
    ...terms,
    sector: peer.sector,
    ppeGross: ppeGross === undefined ? null : ppeGross / given.assetsPrior,
    ppeNet: ppeNet === undefined ? null : ppeNet / given.assetsPrior,
  };
}

function limitsOf(rows: readonly Row[], name: Limited): WinsorLimits | null {
  const values = rows.flatMap((row) => row[name] ?? []);
  return values.length === 0 ? null : winsorLimits(values, WINSOR_TAIL);
}

function fit(rows: readonly Row[], limits: AccrualModel['limits']): Fit | null {
  const ppe: PpeBasis = rows.every((row) => row.ppeGross !== null) ? 'ppeGross' : 'ppeNet';
  const usable = rows.filter((row) => row[ppe] !== null);
  if (usable.length < FEWEST_FIRMS) return null;
  const points = usable.map((row) => regressors(row, ppe, limits));
  const fitted = leastSquares(
    usable.map((row) => drawnIn(row, 'accruals', limits)),
    [1, 2, 3, 4].map((term) => points.map((point) => point[term]!)),
    { constant: true },
  );
  return fitted.ok ? { coefficients: fitted.value.coefficients, ppe } : null;
}

function shiftOf(rows: readonly Row[], pooled: Fit, limits: AccrualModel['limits']): number {
  const residuals = rows.flatMap((row) => residual(row, pooled, limits) ?? []);
  if (residuals.length === 0) return 0;
  const median = linearPercentile(Float64Array.from(residuals).sort(), 0.5);
  return (median * residuals.length) / (residuals.length + SECTOR_SHRINKAGE_FIRMS);
}

function residual(row: Row, { coefficients, ppe }: Fit, limits: AccrualModel['limits']): number | null {
  if (row[ppe] === null) return null;
  const point = regressors(row, ppe, limits);
  return row.accruals - coefficients.reduce((sum, coefficient, term) => sum + coefficient * point[term]!, 0);
}

const regressors = (row: Row, ppe: PpeBasis, limits: AccrualModel['limits']): readonly number[] => [
  1,
  drawnIn(row, 'reciprocalAssets', limits),
  drawnIn(row, 'revenueChange', limits),
  drawnIn(row, ppe, limits),
  drawnIn(row, 'cashFlow', limits),
];

/** Callers have seen that the figure is there. */
function drawnIn(row: Row, name: Limited, limits: AccrualModel['limits']): number {
  const value = row[name];
  const bounds = limits[name];
  if (value === null || bounds === null) throw new Error(`no ${name} to draw in`);
  return clamp(value, bounds);
}
