import { expect, test } from 'vitest';
import { jonesModel, type JonesFirm } from '../accruals/jones.ts';
import { plainDate } from '../calendar/plainDate.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';
import { abnormalOf, publishedModelsFor } from './publishedModels.ts';

/** Figures that spread evenly, so that one per cent at either end is drawn in by nothing that matters. */
const peerOf = (k: number, sector = 'metal goods'): PeerInputs => {
  const assetsPrior = 40 + 3 * k;
  const revenueChange = ((k * 7) % 11) - 4;
  return {
    borrowerId: k + 1,
    sector,
    quarterEnd: plainDate('2025-12-31'),
    ties: true,
    tie: 'ties',
    basis: 'audited',
    derivedCashFlow: false,
    cashFlowPresentationChanged: false,
    daysOnYear: false,
    acquisitionInYear: false,
    acquisitionThisQuarter: false,
    figures: {
      assetsPrior,
      netIncome: 5 + ((k * 3) % 5),
      netIncomePrior: 2 + ((k * 13) % 9),
      cfo: 6 + ((k * 5) % 7),
      revenue: 100 + ((k * k) % 23) + revenueChange,
      revenuePrior: 100 + ((k * k) % 23),
      revenueBefore: 98 + ((k * k) % 23) - ((k * 5) % 6),
      receivables: 20 + ((k * 3) % 4),
      receivablesPrior: 19,
      ppeGross: 20 + ((k * 5) % 17),
      ppeNet: 12 + ((k * 5) % 13),
      productionCosts: 60 + ((k * 11) % 9),
      discretionaryExpenses: 20 + ((k * 7) % 5),
    },
  };
};
const lacking = (peer: PeerInputs, figure: PeerFigure): PeerInputs => ({
  ...peer,
  figures: Object.fromEntries(Object.entries(peer.figures).filter(([name]) => name !== figure)),
});
const peers = Array.from({ length: 24 }, (_, k) => peerOf(k));

const jonesFirm = ({ figures }: PeerInputs): JonesFirm => ({
  lagAssets: figures.assetsPrior!,
  totalAccruals: figures.netIncome! - figures.cfo!,
  revenueChange: figures.revenue! - figures.revenuePrior!,
  receivablesChange: figures.receivables! - figures.receivablesPrior!,
  ppeGross: figures.ppeGross!,
  priorReturnOnAssets: figures.netIncomePrior! / figures.assetsPrior!,
  cashFromOperations: figures.cfo!,
});

const valueOf = (abnormal: ReturnType<typeof abnormalOf>): number => {
  if ('missing' in abnormal) throw new Error(abnormal.missing);
  return abnormal.value;
};

test.each([
  ['jones', 'jones-1991'],
  ['modified-jones', 'modified-1995'],
  ['kothari', 'kothari'],
] as const)(
  '%s leaves what the published model leaves, but for the tails that are drawn in',
  (model, published) => {
    const models = publishedModelsFor(peers);
    const fit = jonesModel(published, peers.map(jonesFirm));
    if (!fit.ok) throw new Error(fit.error.kind);
    const residuals = peers.map((peer) => valueOf(abnormalOf(models, peer, model)));
    residuals.forEach((residual, k) =>
      expect(Math.abs(residual - fit.value.residuals[k]!)).toBeLessThan(0.01),
    );
  },
);

test('a model with a constant leaves nothing on average', () => {
  const models = publishedModelsFor(peers);
  for (const model of ['kothari', 'abnormal-cash-flow', 'abnormal-production'] as const) {
    const mean =
      peers.reduce((sum, peer) => sum + valueOf(abnormalOf(models, peer, model)), 0) / peers.length;
    expect(Math.abs(mean)).toBeLessThan(0.005);
  }
});

test.each([
  ['jones', 10],
  ['modified-jones', 10],
  ['kothari', 11],
  ['abnormal-cash-flow', 15],
  ['abnormal-discretionary', 15],
] as const)('%s needs %d firms of the sector and quarter', (model, firms) => {
  const enough = publishedModelsFor(peers.slice(0, firms));
  const few = publishedModelsFor(peers.slice(0, firms - 1));
  expect(abnormalOf(enough, peers[0]!, model)).toMatchObject({ firms });
  expect(abnormalOf(few, peers[0]!, model)).toEqual({
    missing: `${firms - 1} borrowers of the sector have the figures at this quarter end, ${firms} are needed`,
  });
});

test('one firm without gross property, plant and equipment puts the whole group on net', () => {
  const mixed = [...peers.slice(0, 3), lacking(peers[3]!, 'ppeGross'), ...peers.slice(4)];
  const onNet = mixed.map((peer) => ({
    ...peer,
    figures: { ...peer.figures, ppeGross: peer.figures.ppeNet! },
  }));
  expect(valueOf(abnormalOf(publishedModelsFor(mixed), mixed[0]!, 'jones'))).toBeCloseTo(
    valueOf(abnormalOf(publishedModelsFor(onNet), onNet[0]!, 'jones')),
    10,
  );
});

test('a firm that lacks a figure is left out of the fit and has no residual', () => {
  const without = lacking(peers[0]!, 'receivablesPrior');
  const models = publishedModelsFor([without, ...peers.slice(1)]);
  expect(abnormalOf(models, without, 'kothari')).toEqual({ missing: 'a figure of the model is missing' });
  expect(abnormalOf(models, peers[1]!, 'kothari')).toMatchObject({ firms: 23 });
});

test('a cross-section stored before the models were kept has none', () => {
  expect(abnormalOf(undefined, peers[0]!, 'jones')).toMatchObject({
    missing: expect.stringMatching(/^0 borrowers/) as string,
  });
});

test('terms that do not differ among the firms are said to, whatever the number of firms', () => {
  const alike = peers.map((peer) => ({
    ...peer,
    figures: { ...peer.figures, assetsPrior: 50, revenuePrior: 100 },
  }));
  expect(abnormalOf(publishedModelsFor(alike), alike[0]!, 'abnormal-discretionary')).toEqual({
    missing: 'the terms hardly differ among the 24 borrowers of the sector, so nothing can be fitted',
  });
});
