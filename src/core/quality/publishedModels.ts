/** The published models that need a cross-section, fitted on each sector at one quarter end. */
import { JONES_FORMS, jonesTerms, type JonesTerm } from '../accruals/jones.ts';
import { formResidual, type LinearForm } from '../accruals/linearForm.ts';
import { REAL_ACTIVITY_FORMS, realActivityTerms, type RealActivityTerm } from '../accruals/realActivities.ts';
import { leastSquares } from '../statistics/leastSquares.ts';
import { clamp, winsorLimits, type WinsorLimits } from '../statistics/winsorise.ts';
import { bySector } from './bySector.ts';
import { figuresOf } from './comparedFigures.ts';
import type { PeerInputs } from './peerFigures.ts';

type Term = JonesTerm | RealActivityTerm;

interface PublishedModelForm {
  readonly form: LinearForm<Term>;
  /** Firms of one sector and quarter that the published work asks for at least. */
  readonly fewestFirms: number;
}

/** Ten observations as is usual, fifteen with Roychowdhury; never fewer than six residual degrees of freedom. */
const MODELS = {
  jones: { form: JONES_FORMS['jones-1991'], fewestFirms: 10 },
  'modified-jones': { form: JONES_FORMS['modified-1995'], fewestFirms: 10 },
  kothari: { form: JONES_FORMS.kothari, fewestFirms: 10 },
  'abnormal-cash-flow': { form: REAL_ACTIVITY_FORMS.cashFlow, fewestFirms: 15 },
  'abnormal-production': { form: REAL_ACTIVITY_FORMS.production, fewestFirms: 15 },
  'abnormal-discretionary': { form: REAL_ACTIVITY_FORMS.discretionary, fewestFirms: 15 },
} as const satisfies Record<string, PublishedModelForm>;
const FEWEST_DEGREES_OF_FREEDOM = 6;
const WINSOR_TAIL = 0.01;

export type PublishedModel = keyof typeof MODELS;
const PUBLISHED_MODELS = Object.keys(MODELS) as readonly PublishedModel[];

/** Property, plant and equipment comes gross and net; a row keeps both. */
const COLUMNS = [
  'accruals',
  'reciprocalAssets',
  'revenueChange',
  'cashRevenueChange',
  'ppe',
  'priorReturnOnAssets',
  'cashFlow',
  'sales',
  'salesChange',
  'salesChangePrior',
  'salesPrior',
  'production',
  'discretionary',
  'ppeNet',
] as const satisfies readonly (Term | 'ppeNet')[];
type Column = (typeof COLUMNS)[number];
/** In the order of COLUMNS, not a number where a figure is missing: there are ten thousand rows. */
type Row = readonly number[];

/** Without coefficients there were too few firms; `net` where property, plant and equipment is net for all of them. */
interface SectorFit {
  readonly coefficients: readonly number[] | null;
  readonly net: boolean;
  readonly firms: number;
}

export interface PublishedModels {
  /** In the order of COLUMNS. */
  readonly limits: readonly (WinsorLimits | null)[];
  readonly sectors: readonly {
    readonly sector: string;
    readonly fits: Readonly<Record<PublishedModel, SectorFit>>;
  }[];
}

/**
 * Every model fitted on each sector that has firms enough; terms are drawn in at the 1st and 99th percentile of the
 * book for fitting. Source: methods.md B1 items 4 and 8.
 *
 * @example publishedModelsFor([]).sectors // => []
 */
export function publishedModelsFor(peers: readonly PeerInputs[]): PublishedModels {
  const rows = peers.map((peer) => ({ sector: peer.sector, row: rowOf(peer) }));
  const limits = COLUMNS.map((_, place) => limitsOf(rows.map(({ row }) => row[place]!)));
  return {
    limits,
    sectors: [...bySector(rows)].map(([sector, own]) => {
      const drawn = own.map(({ row }) => drawnIn(row, limits));
      return {
        sector,
        fits: Object.fromEntries(PUBLISHED_MODELS.map((model) => [model, fit(model, drawn)])) as Record<
          PublishedModel,
          SectorFit
        >,
      };
    }),
  };
}

/** A residual, a share of last year's assets, or why there is none. */
export type Abnormal = { readonly value: number; readonly firms: number } | { readonly missing: string };

/**
 * What a model leaves of a borrower's own figures, which are taken as they are against drawn-in terms.
 *
 * @example 'value' in abnormalOf(crossSection.quarters.at(-1).published, peer, 'jones') // => true
 */
export function abnormalOf(
  models: PublishedModels | null | undefined,
  peer: PeerInputs,
  model: PublishedModel,
): Abnormal {
  const fitted = models?.sectors.find(({ sector }) => sector === peer.sector)?.fits[model];
  if (fitted?.coefficients === null && fitted.firms >= fewestFirms(model))
    return {
      missing: `the terms hardly differ among the ${fitted.firms} borrowers of the sector, so nothing can be fitted`,
    };
  if (!models || !fitted?.coefficients)
    return {
      missing: `${fitted?.firms ?? 0} borrowers of the sector have the figures at this quarter end, ${fewestFirms(model)} are needed`,
    };
  const { form } = MODELS[model];
  const row = rowOf(peer);
  if (!isComplete(row, placesOf(form, fitted.net))) return { missing: 'a figure of the model is missing' };
  const drawn = drawnIn(row, models.limits);
  const at = Object.fromEntries(
    COLUMNS.map((column) => [column, drawn[placeOf(column, fitted.net)]!]),
  ) as Record<Term, number>;
  const response = row[placeOf(form.response, fitted.net)]!;
  return { value: formResidual<Term>(form, fitted.coefficients, response, at), firms: fitted.firms };
}

/**
 * Firms of one sector and quarter end below which a model is not fitted.
 *
 * @example fewestFirms('kothari') // => 11
 */
function fewestFirms(model: PublishedModel): number {
  const { form, fewestFirms: published } = MODELS[model];
  return Math.max(published, form.regressors.length + (form.constant ? 1 : 0) + FEWEST_DEGREES_OF_FREEDOM);
}

function rowOf({ figures }: PeerInputs): Row {
  const base = figuresOf(figures, ['assetsPrior', 'revenue', 'revenuePrior']);
  if (!base || base.assetsPrior <= 0) return COLUMNS.map(() => NaN);
  const { cfo = NaN, netIncome = NaN, netIncomePrior = NaN, revenueBefore = NaN } = figures;
  const { receivables = NaN, receivablesPrior = NaN, ppeGross = NaN, ppeNet = NaN } = figures;
  const { productionCosts = NaN, discretionaryExpenses = NaN } = figures;
  const common = { lagAssets: base.assetsPrior, cashFromOperations: cfo };
  const terms: Record<Column, number> = {
    ...jonesTerms({
      ...common,
      totalAccruals: netIncome - cfo,
      revenueChange: base.revenue - base.revenuePrior,
      receivablesChange: receivables - receivablesPrior,
      ppeGross,
      priorReturnOnAssets: netIncomePrior / base.assetsPrior,
    }),
    ...realActivityTerms({
      ...common,
      sales: base.revenue,
      salesChange: base.revenue - base.revenuePrior,
      salesChangePrior: base.revenuePrior - revenueBefore,
      productionCosts,
      discretionaryExpenses,
    }),
    ppeNet: ppeNet / base.assetsPrior,
  };
  return COLUMNS.map((column) => terms[column]);
}

function limitsOf(values: readonly number[]): WinsorLimits | null {
  const sample = values.filter((value) => !Number.isNaN(value));
  return sample.length === 0 ? null : winsorLimits(sample, WINSOR_TAIL);
}

const drawnIn = (row: Row, limits: PublishedModels['limits']): Row =>
  row.map((value, place) => {
    const bounds = limits[place];
    return bounds && !Number.isNaN(value) ? clamp(value, bounds) : value;
  });

function fit(model: PublishedModel, rows: readonly Row[]): SectorFit {
  const { form } = MODELS[model];
  const net = isNet(form, rows);
  const places = placesOf(form, net);
  const usable = rows.filter((row) => isComplete(row, places));
  const firms = usable.length;
  if (firms < fewestFirms(model)) return { coefficients: null, net, firms };
  const column = (name: Term): number[] => {
    const place = placeOf(name, net);
    return usable.map((row) => row[place]!);
  };
  const fitted = leastSquares(column(form.response), form.regressors.map(column), {
    constant: form.constant,
  });
  return { coefficients: fitted.ok ? fitted.value.coefficients.map(short) : null, net, firms };
}

/** Gross, or net for every firm of a group in which one that could be fitted gives no gross: methods.md B2. */
function isNet(form: LinearForm<Term>, rows: readonly Row[]): boolean {
  if (!form.regressors.includes('ppe')) return false;
  const gross = placeOf('ppe', false);
  const others = placesOf(form, false).filter((place) => place !== gross);
  return rows.some((row) => Number.isNaN(row[gross]) && isComplete(row, others));
}

const placeOf = (column: Column, net: boolean): number =>
  COLUMNS.indexOf(net && column === 'ppe' ? 'ppeNet' : column);

const placesOf = (
  { response, regressors, predictors = [] }: LinearForm<Term>,
  net: boolean,
): readonly number[] => [response, ...regressors, ...predictors].map((term) => placeOf(term, net));

const isComplete = (row: Row, places: readonly number[]): boolean =>
  places.every((place) => !Number.isNaN(row[place]));

/** Twelve digits: finer than any accounts. */
const short = (value: number): number => Number(value.toPrecision(12));
