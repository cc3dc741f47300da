import { expect, test } from 'vitest';
import { AS_OF, buildBook, buildBorrower } from './book.fixture.ts';
import { middleOf } from '../statistics/percentile.ts';
import { COMPARED_FIGURES, type ComparedFigure } from './comparedFigures.ts';
import {
  buildCrossSection,
  type CrossSection,
  type PeerInputs,
  type QuarterCrossSection,
} from './crossSection.ts';
import { peerInputsOfQuarters } from './peerInputs.ts';
import { scoreQuarter } from './quarterScore.ts';

const peersOf = (...borrowers: Parameters<typeof peerInputsOfQuarters>[0][]): PeerInputs[] =>
  borrowers.flatMap((borrower) => peerInputsOfQuarters(borrower, AS_OF));
const latestOf = (...args: Parameters<typeof buildBorrower>): PeerInputs =>
  peersOf(buildBorrower(...args)).at(-1)!;

const book = peersOf(
  ...buildBook(14, 'metal goods', 1),
  ...buildBook(12, 'food', 100),
  ...buildBook(3, 'printing', 200),
);
const crossSection = buildCrossSection(book, 7);

test('survives being stored as JSON', () => {
  const stored = JSON.parse(JSON.stringify(crossSection)) as CrossSection;
  expect(stored).toEqual(crossSection);
  const peer = latestOf(3);
  expect(scoreQuarter(peer, stored)).toEqual(scoreQuarter(peer, crossSection));
});

test('a borrower is not compared with itself: its own stored figures move none of its percentiles', () => {
  const changed = latestOf(3, { receivablesUp: 0.3 });
  // The same stored peers without the borrower's figures, under the same accrual models.
  const others: CrossSection = {
    ...crossSection,
    quarters: crossSection.quarters.map((quarter) => withoutBorrower(quarter, '3')),
  };
  const score = scoreQuarter(changed, crossSection);
  expect(score.sectorPeers).toBe(13);
  expect(score).toEqual(scoreQuarter(changed, others));
});

function withoutBorrower(quarter: QuarterCrossSection, id: string): QuarterCrossSection {
  const { [id]: own, ...members } = quarter.members;
  if (!own) throw new Error(`no member ${id}`);
  const left = (sector: number | null, k: number): number[] =>
    Object.values(members)
      .filter((member) => sector === null || member.sector === sector)
      .flatMap((member) => member.figures[k] ?? [])
      .sort((a, b) => a - b);
  const perFigure = <T>(read: (k: number) => T): Record<ComparedFigure, T> =>
    Object.fromEntries(COMPARED_FIGURES.map((figure, k) => [figure, read(k)])) as Record<ComparedFigure, T>;
  return {
    ...quarter,
    members,
    firms: quarter.firms - 1,
    sectors: quarter.sectors.map(({ sector, firms }, place) => ({
      sector,
      firms: firms - (place === own.sector ? 1 : 0),
      sorted: perFigure((k) => left(place, k)),
    })),
    bookMiddle: perFigure((k) => middleOf(left(null, k))),
  };
}

test('a borrower that changed its sector is left out of the old one and compared in the new one', () => {
  const moved = { ...latestOf(3), sector: 'food' };
  const score = scoreQuarter(moved, crossSection);
  expect(score.sectorPeers).toBe(12);
  expect(score.bookPeers).toBe(28);
});

test('few peers in the sector lean on the whole book', () => {
  const score = scoreQuarter(latestOf(200, { sector: 'printing' }), crossSection);
  expect(score).toMatchObject({ sectorPeers: 2, bookPeers: 28, sectorWeight: 0.2 });
  expect(score.blocks[0]?.figures).toMatchObject({
    unexplainedShareMedianOfBook: 1,
    unexplainedSharePeers: 28,
  });
});

test('a sector that nobody else is in is compared with ten others or not at all', () => {
  const alone = { ...latestOf(500, { sector: 'shipping' }) };
  const others = (count: number) => buildCrossSection(peersOf(...buildBook(count, 'food', 100)), 1);
  expect(scoreQuarter(alone, others(10)).blocks[1]?.risk).not.toBeNull();
  expect(scoreQuarter(alone, others(9))).toMatchObject({ score: null, coverage: 10 });
});

test('the accrual model needs eleven firms: ten in a sector use the slopes of the book', () => {
  const sectors = buildCrossSection(
    peersOf(...buildBook(11, 'food', 100), ...buildBook(10, 'metal goods', 1)),
    1,
  ).quarters.at(-1)?.accrualModel?.sectors;
  expect(sectors?.map((sector) => ('own' in sector ? 'own' : 'shifted'))).toEqual(['own', 'shifted']);
  const ten = buildCrossSection(peersOf(...buildBook(10, 'food', 100)), 1);
  expect(ten.quarters.at(-1)?.accrualModel?.pooled).toBeNull();
});

test('a firm without gross figures sets its whole sector on net', () => {
  const bare = book.map((peer) =>
    peer.borrowerId === 1
      ? {
          ...peer,
          figures: Object.fromEntries(Object.entries(peer.figures).filter(([name]) => name !== 'ppeGross')),
        }
      : peer,
  );
  const model = buildCrossSection(bare, 1).quarters.at(-1)?.accrualModel;
  const basis = (name: string) => {
    const sector = model?.sectors.find((each) => each.sector === name);
    return sector && 'own' in sector ? sector.own.ppe : null;
  };
  expect([basis('metal goods'), basis('food'), model?.pooled?.ppe]).toEqual(['ppeNet', 'ppeGross', 'ppeNet']);
});

test('accounts that do not tie stay out of the peers and get no score', () => {
  const untied = book.map((peer) => (peer.borrowerId === 5 ? { ...peer, ties: false } : peer));
  expect(buildCrossSection(untied, 1).quarters.at(-1)?.firms).toBe(28);
  expect(scoreQuarter({ ...latestOf(5), ties: false }, crossSection)).toMatchObject({
    score: null,
    noScoreReason: 'The accounts do not tie, so they are not scored.',
  });
});

test('a quarter end that nobody else has reported has no score and says so', () => {
  expect(scoreQuarter(latestOf(3), { version: 0, quarters: [] })).toMatchObject({
    score: null,
    noScoreReason: 'No other accounts of this quarter end are in the book as of last night.',
  });
});

test('the later of two quarter ends in one calendar quarter counts', () => {
  const later = { ...latestOf(3), quarterEnd: '2026-10-31' } as const;
  const section = buildCrossSection([latestOf(3), { ...later, sector: 'food' }], 1);
  expect(section.quarters).toHaveLength(1);
  expect(section.quarters[0]?.sectors.map(({ sector }) => sector)).toEqual(['food']);
});
