/**
 * F-score, model 1 of Dechow, Ge, Larson & Sloan (2011, Contemporary Accounting Research 28, table 7). Weights from
 * memory; all but the constant and the weight of return on assets agree with a public page that prints -7.897 and
 * -0.923, which is taken for a transcription.
 */
export interface FScoreInputs {
  /** Over average assets. */
  readonly totalAccruals: number;
  readonly receivablesChange: number;
  readonly inventoryChange: number;
  /** Assets that are neither property, plant and equipment nor cash, over assets. */
  readonly softAssets: number;
  /** Growth of sales less the change of receivables. */
  readonly cashSalesGrowth: number;
  readonly returnOnAssetsChange: number;
  /** Whether debt or equity was issued in the year. */
  readonly hasIssued: boolean;
}

export interface FScore {
  readonly predicted: number;
  readonly probability: number;
  readonly f: number;
  readonly band: 'normal' | 'above normal' | 'substantial' | 'high';
}

/** Share of misstating firm-years in the paper's sample. */
const UNCONDITIONAL = 0.0037;

/**
 * The F-score: the model's probability over that of the sample. 1 is the average firm.
 *
 * @example fScore({ totalAccruals: 0, receivablesChange: 0, inventoryChange: 0, softAssets: 0, cashSalesGrowth: 0, returnOnAssetsChange: 0, hasIssued: false }).predicted // => -7.893
 */
export const fScore = (inputs: FScoreInputs): FScore =>
  fScoreAt(
    -7.893 +
      0.79 * inputs.totalAccruals +
      2.518 * inputs.receivablesChange +
      1.191 * inputs.inventoryChange +
      1.979 * inputs.softAssets +
      0.171 * inputs.cashSalesGrowth -
      0.932 * inputs.returnOnAssetsChange +
      1.029 * (inputs.hasIssued ? 1 : 0),
  );

/**
 * The F-score at a predicted value.
 *
 * @example fScoreAt(-4).band // => 'high'
 */
export function fScoreAt(predicted: number): FScore {
  const probability = 1 / (1 + Math.exp(-predicted));
  const f = probability / UNCONDITIONAL;
  return { predicted, probability, f, band: bandOf(f) };
}

/**
 * The predicted value at which the probability is the given one.
 *
 * @example predictedAt(0.5) // => 0
 */
export const predictedAt = (probability: number): number => Math.log(probability / (1 - probability));

/** Lines from memory. */
function bandOf(f: number): FScore['band'] {
  if (f > 2.45) return 'high';
  if (f > 1.85) return 'substantial';
  return f > 1 ? 'above normal' : 'normal';
}
