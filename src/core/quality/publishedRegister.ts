/** The published measures that stand beside the score: what each is called, printed as, held against, and is not. */
import type { PublishedMeasureKey } from './publishedMeasure.ts';
import type { QualityBlockName } from './score.ts';

/** A line that was published: a value beyond it is called so by its authors. */
export interface PublishedLine {
  readonly at: number;
  readonly side: 'above' | 'below';
  readonly says: string;
}

export interface PublishedEntry {
  readonly name: string;
  readonly source: string;
  readonly print: 'share' | 'number';
  readonly lines: readonly PublishedLine[];
  readonly isNot: string;
  readonly topic: PublishedTopic;
  /** The block of the score that it enters; null where it stands beside it. */
  readonly inScore: QualityBlockName | null;
}

/** Each has a method page. */
export type PublishedTopic =
  | 'accruals'
  | 'jones-models'
  | 'accrual-noise'
  | 'm-score'
  | 'f-score'
  | 'real-activities'
  | 'smoothing'
  | 'cash-conversion'
  | 'altman-z'
  | 'ohlson-zmijewski';

const NO_LINES: readonly PublishedLine[] = [];
const DISTRESS = 'Not reporting quality: how near to failure the firms of a sample looked.';

const accruals = (name: string, source: string, isNot: string): PublishedEntry => ({
  name,
  source,
  print: 'share',
  lines: NO_LINES,
  isNot,
  topic: 'accruals',
  inScore: null,
});

const regression = (
  name: string,
  source: string,
  topic: 'jones-models' | 'real-activities',
): PublishedEntry => ({
  name,
  source,
  print: 'share',
  lines: NO_LINES,
  isNot:
    topic === 'jones-models'
      ? 'Not controlled for growth: fast growers leave residuals too.'
      : 'Not a rule broken: selling, producing and spending are decisions of the business.',
  topic,
  inScore: null,
});

const smoothing = (name: string): PublishedEntry => ({
  name,
  source: 'Leuz, Nanda and Wysocki 2003',
  print: 'number',
  lines: NO_LINES,
  isNot: 'A description only: the paper compares medians of countries, not firms.',
  topic: 'smoothing',
  inScore: null,
});

const ALTMAN_LINES = (distress: number, safe: number): readonly PublishedLine[] => [
  { at: distress, side: 'below', says: 'zone of distress' },
  { at: safe, side: 'above', says: 'safe zone' },
];

export const PUBLISHED_REGISTER: Readonly<Record<PublishedMeasureKey, PublishedEntry>> = {
  sloan: accruals(
    'Accruals out of balance sheets',
    'Sloan 1996',
    'Moved by acquisitions, disposals and currency as well.',
  ),
  'cash-flow-accruals': accruals(
    'Accruals by the cash flow statement',
    'Hribar and Collins 2002',
    'Not abnormal by itself: growth takes working capital.',
  ),
  'percent-accruals': accruals(
    'Accruals over the size of net income',
    'Hafzalla, Lundholm and Van Winkle 2011',
    'Large where net income is near nought, whatever the accruals.',
  ),
  'total-accruals': accruals(
    'Total accruals',
    'Richardson, Sloan, Soliman and Tuna 2005',
    'Holds investment in fixed assets too, which is no judgement.',
  ),
  'net-operating-assets': accruals(
    'Rise of net operating assets',
    'Richardson, Sloan, Soliman and Tuna 2005',
    'Marks every acquirer: in our simulation 98 % of them stood in the top tenth.',
  ),
  jones: regression('Discretionary accruals', 'Jones 1991', 'jones-models'),
  'modified-jones': regression(
    'Discretionary accruals, modified',
    'Dechow, Sloan and Sweeney 1995',
    'jones-models',
  ),
  kothari: regression(
    'Discretionary accruals, performance taken out',
    'Kothari, Leone and Wasley 2005',
    'jones-models',
  ),
  'dechow-dichev': {
    name: 'Accrual noise',
    source: 'Dechow and Dichev 2002',
    print: 'share',
    lines: NO_LINES,
    isNot: 'Cannot tell management from a volatile business.',
    topic: 'accrual-noise',
    inScore: 'accrual noise',
  },
  mcnichols: {
    name: 'Accrual noise, growth and plant taken out',
    source: 'McNichols 2002',
    print: 'share',
    lines: NO_LINES,
    isNot: 'Cannot tell management from a volatile business.',
    topic: 'accrual-noise',
    inScore: null,
  },
  'm-score': {
    name: 'M-score, eight variables',
    source: 'Beneish 1999',
    print: 'number',
    lines: [{ at: -1.78, side: 'above', says: 'marked by the paper' }],
    isNot: 'Not a chance: most firms above the line are honest, acquirers and fast growers above all.',
    topic: 'm-score',
    inScore: 'published screens',
  },
  'm-score-five': {
    name: 'M-score, five variables',
    source: 'Beneish 1999',
    print: 'number',
    lines: [{ at: -2.22, side: 'above', says: 'marked by its users' }],
    isNot: 'Not a chance, and blind to cash.',
    topic: 'm-score',
    inScore: null,
  },
  'f-score': {
    name: 'F-score, model 1',
    source: 'Dechow, Ge, Larson and Sloan 2011',
    print: 'number',
    lines: [
      { at: 1, side: 'above', says: 'above normal' },
      { at: 1.85, side: 'above', says: 'substantial' },
      { at: 2.45, side: 'above', says: 'high' },
    ],
    isNot: 'A ratio to the average public firm of the sample, not a chance for this borrower.',
    topic: 'f-score',
    inScore: 'published screens',
  },
  'abnormal-cash-flow': regression('Abnormal cash from operations', 'Roychowdhury 2006', 'real-activities'),
  'abnormal-production': regression('Abnormal production', 'Roychowdhury 2006', 'real-activities'),
  'abnormal-discretionary': regression(
    'Abnormal discretionary spending',
    'Roychowdhury 2006',
    'real-activities',
  ),
  'real-activities': regression('The three together', 'after Roychowdhury 2006', 'real-activities'),
  'smoothing-spread': smoothing('Spread of operating profit over that of cash'),
  'smoothing-correlation': smoothing('Correlation of changes of accruals and cash'),
  'smoothing-size': smoothing('Size of accruals over size of cash'),
  'cash-conversion': {
    name: 'Cash conversion',
    source: 'own',
    print: 'share',
    lines: NO_LINES,
    isNot: 'Not allowed for growth, which takes cash from every honest grower.',
    topic: 'cash-conversion',
    inScore: null,
  },
  'growth-neutral-conversion': {
    name: 'Cash conversion after allowing for growth',
    source: 'own',
    print: 'share',
    lines: NO_LINES,
    isNot: 'Not free cash: fixed assets and debt service come after it.',
    topic: 'cash-conversion',
    inScore: 'cash conversion',
  },
  'altman-private': {
    name: 'Z′, private firms',
    source: 'Altman 1983',
    print: 'number',
    lines: ALTMAN_LINES(1.23, 2.9),
    isNot: DISTRESS,
    topic: 'altman-z',
    inScore: null,
  },
  'altman-any-trade': {
    name: 'Z″, any trade',
    source: 'Altman 1995',
    print: 'number',
    lines: ALTMAN_LINES(1.1, 2.6),
    isNot: DISTRESS,
    topic: 'altman-z',
    inScore: null,
  },
  ohlson: {
    name: 'O-score',
    source: 'Ohlson 1980',
    print: 'number',
    lines: [{ at: Math.log(0.038 / 0.962), side: 'above', says: 'above the paper’s cut of 3.8 %' }],
    isNot: DISTRESS,
    topic: 'ohlson-zmijewski',
    inScore: null,
  },
  zmijewski: {
    name: 'X-score',
    source: 'Zmijewski 1984',
    print: 'number',
    lines: [{ at: 0, side: 'above', says: 'above one half' }],
    isNot: DISTRESS,
    topic: 'ohlson-zmijewski',
    inScore: null,
  },
};

/**
 * What the published lines call a value: the furthest one that it is past; null where it is past none.
 *
 * @example saidOf('f-score', 1.9) // => 'substantial'
 */
export function saidOf(key: PublishedMeasureKey, value: number): string | null {
  const passed = PUBLISHED_REGISTER[key].lines.filter(({ at, side }) =>
    side === 'above' ? value > at : value < at,
  );
  return passed.at(-1)?.says ?? null;
}
