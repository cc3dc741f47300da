/** The blocks of the score: each turns a borrower's standing among its peers into a risk from 0 to 1. */
import { block, gated, NOBODY, placeFigures, without, type Block, type BlockContext } from './blockParts.ts';
import { conversionOf, revenueGrowth } from './comparedFigures.ts';
import { brokenSeries, missingFigures } from './missingFigures.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';
import { withoutConversion } from './publishedAccruals.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import type { QualityBlock } from './score.ts';
import { fScoreRisk, mScoreRisk } from './screens.ts';
import { stretchBlock } from './stretchBlock.ts';

const { gates, fastGrowth } = QUALITY_TABLE;

/** In the order of the table of weights. */
export const BLOCKS: readonly Block[] = [
  unexplainedBlock,
  stretchBlock,
  conversionBlock,
  screensBlock,
  noiseBlock,
];

const UNEXPLAINED_INPUTS: readonly PeerFigure[] = [
  'assetsPrior',
  'netIncome',
  'impairmentAfterTax',
  'cfo',
  'capex',
  'capitalisedCosts',
  'revenue',
  'revenuePrior',
];

const NO_MODEL =
  'too few peers for the accrual model, or theirs rests on property, plant and equipment gross or net where this borrower gives the other';

function unexplainedBlock({ peer, compared, standing }: BlockContext): QualityBlock {
  const share = compared.unexplainedAccruals;
  if (share === null) {
    const ppe = peer.figures.ppeGross === undefined && peer.figures.ppeNet === undefined;
    const missing = missingFigures(peer, [...UNEXPLAINED_INPUTS, ...(ppe ? (['ppeGross'] as const) : [])]);
    return without('unexplained accruals', brokenSeries(peer) ?? missing ?? NO_MODEL);
  }
  const place = standing('unexplainedAccruals');
  if (!place) return without('unexplained accruals', NOBODY, { unexplainedShare: share });
  const isSmall = share < gates.unexplainedShareOfAssets;
  return {
    ...block('unexplained accruals', gated(place.percentile, isSmall), place),
    figures: { unexplainedShare: share, ...placeFigures('unexplainedShare', place) },
  };
}

function conversionBlock({ peer, standing }: BlockContext): QualityBlock {
  const conversion = conversionOf(peer.figures);
  if (!conversion) return without('cash conversion', withoutConversion(peer));
  const place = standing('cashConversion');
  const figures = {
    conversion: conversion.growthNeutral,
    conversionPlain: conversion.conversion,
    ...growthFigure(peer),
    ...placeFigures('conversion', place),
  };
  if (!place) return without('cash conversion', NOBODY, figures);
  const isEnough = conversion.growthNeutral > gates.conversionEnough;
  return { ...block('cash conversion', gated(1 - place.percentile, isEnough), place), figures };
}

function screensBlock({ peer }: BlockContext): QualityBlock {
  const { mScore, fScore } = peer.figures;
  const figures = {
    ...(mScore !== undefined && { mScore, mScoreVariables: peer.mScoreForm === 'M5' ? 5 : 8 }),
    ...(fScore !== undefined && { fScore }),
  };
  const damped = dampedReason(peer);
  if (damped) return without('published screens', damped, figures);
  if (mScore === undefined || fScore === undefined)
    return without('published screens', missingScreens(peer), figures);
  return {
    ...block('published screens', (mScoreRisk(mScore) + fScoreRisk(fScore)) / 2, null),
    figures,
  };
}

const missingScreens = ({ figures, whyMissing }: PeerInputs): string =>
  (['mScore', 'fScore'] as const)
    .filter((screen) => figures[screen] === undefined)
    .map((screen) => `${screen === 'mScore' ? 'M-score' : 'F-score'}: ${whyMissing?.[screen] ?? 'missing'}`)
    .join('; ');

function noiseBlock({ peer, standing }: BlockContext): QualityBlock {
  const { accrualNoise } = peer.figures;
  const damped = dampedReason(peer);
  if (accrualNoise === undefined)
    return without('accrual noise', damped ?? peer.whyMissing?.accrualNoise ?? 'missing');
  const place = standing('accrualNoise');
  const figures = { accrualNoise, ...placeFigures('accrualNoise', place) };
  if (damped) return without('accrual noise', damped, figures);
  if (!place) return without('accrual noise', NOBODY, figures);
  return { ...block('accrual noise', place.percentile, place), figures };
}

/** Measures built on growth mark a fast grower and an acquirer whatever their accounts are like. */
function dampedReason(peer: PeerInputs): string | null {
  if (peer.acquisitionInYear) return 'an acquisition in the year: measures built on growth are left out';
  const growth = revenueGrowth(peer.figures);
  return growth !== null && growth > fastGrowth
    ? 'revenue grew more than 25\u00a0%: measures built on growth are left out'
    : null;
}

function growthFigure(peer: PeerInputs): Record<string, number> {
  const growth = revenueGrowth(peer.figures);
  return growth === null ? {} : { revenueGrowth: growth };
}
