/**
 * Published distress scores. They say how near to failure firms of a sample looked, nothing about how earnings were
 * reported: shown beside reporting quality, never inside.
 */
import { normalCdf } from '../statistics/normalDistribution.ts';

export type Zone = 'safe' | 'grey' | 'distress';

/** The five ratios of Altman. X4 differs by form: equity at market value or at book over liabilities. */
export interface AltmanRatios {
  readonly workingCapitalOverAssets: number;
  readonly retainedEarningsOverAssets: number;
  readonly ebitOverAssets: number;
  readonly equityOverLiabilities: number;
  readonly salesOverAssets: number;
}

interface AltmanForm {
  readonly weights: readonly [number, number, number, number, number];
  readonly constant: number;
  readonly distressBelow: number;
  readonly safeAbove: number;
}

/**
 * The forms by name: 1968 for listed manufacturers, the private one with book equity, the one without sales for any
 * trade, and the last with 3.25 added, whose lines move by 3.25 as well. Weights and zones confirmed in public pages.
 */
export const ALTMAN_FORMS = {
  listed: { weights: [1.2, 1.4, 3.3, 0.6, 1], constant: 0, distressBelow: 1.81, safeAbove: 2.99 },
  private: {
    weights: [0.717, 0.847, 3.107, 0.42, 0.998],
    constant: 0,
    distressBelow: 1.23,
    safeAbove: 2.9,
  },
  anyTrade: { weights: [6.56, 3.26, 6.72, 1.05, 0], constant: 0, distressBelow: 1.1, safeAbove: 2.6 },
  anyTradeShifted: {
    weights: [6.56, 3.26, 6.72, 1.05, 0],
    constant: 3.25,
    distressBelow: 4.35,
    safeAbove: 5.85,
  },
} as const satisfies Record<string, AltmanForm>;

/**
 * Z in one of its forms, with its zone. Flows over twelve months, never one quarter.
 *
 * @example altmanZ('listed', { workingCapitalOverAssets: 0.2, retainedEarningsOverAssets: 0.3, ebitOverAssets: 0.23, equityOverLiabilities: 0.5, salesOverAssets: 0.8 }) // => { z: 2.519, zone: 'grey' }
 */
export function altmanZ(
  form: keyof typeof ALTMAN_FORMS,
  ratios: AltmanRatios,
): { readonly z: number; readonly zone: Zone } {
  const { weights, constant, distressBelow, safeAbove } = ALTMAN_FORMS[form];
  const z =
    constant +
    weights[0] * ratios.workingCapitalOverAssets +
    weights[1] * ratios.retainedEarningsOverAssets +
    weights[2] * ratios.ebitOverAssets +
    weights[3] * ratios.equityOverLiabilities +
    weights[4] * ratios.salesOverAssets;
  return { z, zone: z < distressBelow ? 'distress' : z > safeAbove ? 'safe' : 'grey' };
}

export interface DistressScore {
  readonly score: number;
  readonly probability: number;
}

/** Assets in whole currency units over a price level of 100 in 1968; the other amounts in one unit. */
export interface OhlsonInputs {
  readonly realAssets: number;
  readonly totalAssets: number;
  readonly totalLiabilities: number;
  readonly currentAssets: number;
  readonly currentLiabilities: number;
  readonly netIncome: number;
  readonly netIncomePrior: number;
  readonly fundsFromOperations: number;
  /** A loss in each of the last two years. */
  readonly hasTwoLosses: boolean;
}

/**
 * Ohlson (1980, Journal of Accounting Research 18), model 1. Assets in thousands instead of units move it by 2.8.
 *
 * @example ohlsonO({ realAssets: 125000, totalAssets: 100, totalLiabilities: 62, currentAssets: 42, currentLiabilities: 28, netIncome: 4, netIncomePrior: 3.2, fundsFromOperations: 8.5, hasTwoLosses: false }).probability // => 0.0515…
 */
export function ohlsonO(inputs: OhlsonInputs): DistressScore {
  const { totalAssets: assets, totalLiabilities, netIncome, netIncomePrior } = inputs;
  const swing = Math.abs(netIncome) + Math.abs(netIncomePrior);
  const score =
    -1.32 -
    0.407 * Math.log(inputs.realAssets) +
    (6.03 * totalLiabilities) / assets -
    (1.43 * (inputs.currentAssets - inputs.currentLiabilities)) / assets +
    (0.0757 * inputs.currentLiabilities) / inputs.currentAssets -
    (2.37 * netIncome) / assets -
    (1.83 * inputs.fundsFromOperations) / totalLiabilities +
    0.285 * (inputs.hasTwoLosses ? 1 : 0) -
    1.72 * (totalLiabilities > assets ? 1 : 0) -
    (swing === 0 ? 0 : (0.521 * (netIncome - netIncomePrior)) / swing);
  return { score, probability: 1 / (1 + Math.exp(-score)) };
}

/**
 * Zmijewski (1984, Journal of Accounting Research 22), weights from memory. The sign of the liquidity term is printed
 * both ways; its effect is about 0.01.
 *
 * @example zmijewskiX({ netIncome: 4, totalAssets: 100, totalLiabilities: 62, currentAssets: 42, currentLiabilities: 28 }).score // => -0.98954
 */
export function zmijewskiX(
  inputs: {
    readonly netIncome: number;
    readonly totalAssets: number;
    readonly totalLiabilities: number;
    readonly currentAssets: number;
    readonly currentLiabilities: number;
  },
  liquiditySign: 1 | -1 = 1,
): DistressScore {
  const score =
    -4.336 -
    (4.513 * inputs.netIncome) / inputs.totalAssets +
    (5.679 * inputs.totalLiabilities) / inputs.totalAssets +
    (liquiditySign * 0.004 * inputs.currentAssets) / inputs.currentLiabilities;
  return { score, probability: normalCdf(score) };
}
