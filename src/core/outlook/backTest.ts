/** What was said of past tests, with only what lay before, against what happened. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { nextTest } from './nextTest.ts';
import { peerChanges } from './peerChanges.ts';
import { PROJECTION_WORDS, projectionWord, type ProjectionWord } from './projectionWord.ts';
import {
  historiesAt,
  HORIZONS,
  ratioGrids,
  type Horizon,
  type RatioGrid,
  type RatioRow,
} from './ratioGrid.ts';
import type { RatioAt, RatioSeries } from './ratioSeries.ts';

export interface ProjectionRecord {
  /** The first and last quarter ends from which something was said; null where nothing could be. */
  readonly from: PlainDate | null;
  readonly until: PlainDate | null;
  readonly horizons: readonly HorizonRecord[];
}

/** One row of the reliability table for each word. */
export interface HorizonRecord {
  readonly quarters: Horizon;
  readonly said: number;
  readonly notMet: number;
  /** Tests of which nothing could be said. */
  readonly tooFewPeers: number;
  /** Mean squared distance of what was said from what happened, 0 to 1; null where nothing was said. */
  readonly brier: number | null;
  /** The same for somebody who always said the share that was not met over all of them. */
  readonly brierOfBaseRate: number | null;
  readonly words: readonly WordRecord[];
}

export interface WordRecord {
  readonly word: ProjectionWord;
  readonly said: number;
  readonly notMet: number;
  /** Mean of the shares that were said; null where nothing was. */
  readonly meanSaid: number | null;
  /** Of those whose latest test was met when it was said. */
  readonly afterMet: { readonly said: number; readonly notMet: number };
}

/** One thing that was said and what came of it. */
export interface Said {
  readonly share: number;
  readonly wasMet: boolean;
  readonly cameNotMet: boolean;
}

/**
 * For every past quarter end: each test projected over one to four quarters out of the changes that had ended by then,
 * with the leverage of then, at the level that was in force when the test came. What came is read off the ratios as
 * they are known today. Whoever had no result then, or none that means anything, was told nothing.
 *
 * Time grows with quarter ends times n log n. Source: methods.md Part C 2.2 c; Brier (1950, Monthly Weather Review 78:1-3).
 *
 * @example projectionRecord([]).horizons[0]?.said // => 0
 */
export function projectionRecord(ratios: readonly RatioSeries[]): ProjectionRecord {
  const tallies = new Map(HORIZONS.map((quarters) => [quarters, newTally()]));
  const quarterEnds: PlainDate[] = [];
  for (const grid of ratioGrids(ratios).values()) {
    for (let place = 1; place < grid.quarterEnds.length - 1; place += 1)
      if (lookBack(grid, place, tallies)) quarterEnds.push(grid.quarterEnds[place]!);
  }
  quarterEnds.sort();
  return {
    from: quarterEnds[0] ?? null,
    until: quarterEnds.at(-1) ?? null,
    horizons: HORIZONS.map((quarters) => horizonRecord(quarters, tallies.get(quarters)!)),
  };
}

interface Tally {
  readonly said: Said[];
  tooFewPeers: number;
}

const newTally = (): Tally => ({ said: [], tooFewPeers: 0 });

/** True where anything was said. */
function lookBack(grid: RatioGrid, place: number, tallies: ReadonlyMap<Horizon, Tally>): boolean {
  const histories = historiesAt(grid, place);
  let isAnySaid = false;
  for (const quarters of HORIZONS) {
    if (place < quarters || place + quarters >= grid.quarterEnds.length) continue;
    const tally = tallies.get(quarters)!;
    const peers = peerChanges(histories, quarters);
    for (const row of grid.rows) {
      const [then, later] = [row.points[place], row.points[place + quarters]];
      if (!then?.hasEarnings || !(then.ratio > 0) || !later || later.level === null) continue;
      const found = nextTest(peers, { ...row, ratio: then.ratio, level: later.level });
      if (!found.ok) {
        tally.tooFewPeers += 1;
        continue;
      }
      isAnySaid = true;
      tally.said.push({
        share: found.value.share,
        wasMet: then.level !== null && !isNotMetAt(row, then, then.level),
        cameNotMet: isNotMetAt(row, later, later.level),
      });
    }
  }
  return isAnySaid;
}

const isNotMetAt = ({ bound }: RatioRow, { ratio, hasEarnings }: RatioAt, level: number): boolean =>
  !hasEarnings || (bound === 'most' ? ratio > level : ratio < level);

function horizonRecord(quarters: Horizon, { said, tooFewPeers }: Tally): HorizonRecord {
  const notMet = countNotMet(said);
  const rate = said.length === 0 ? 0 : notMet / said.length;
  return {
    quarters,
    said: said.length,
    notMet,
    tooFewPeers,
    brier: brierScore(said),
    brierOfBaseRate: said.length === 0 ? null : rate * (1 - rate),
    words: PROJECTION_WORDS.map((word) =>
      wordRecord(
        word,
        said.filter(({ share }) => projectionWord(share) === word),
      ),
    ),
  };
}

function wordRecord(word: ProjectionWord, said: readonly Said[]): WordRecord {
  const afterMet = said.filter(({ wasMet }) => wasMet);
  return {
    word,
    said: said.length,
    notMet: countNotMet(said),
    meanSaid: said.length === 0 ? null : said.reduce((sum, { share }) => sum + share, 0) / said.length,
    afterMet: { said: afterMet.length, notMet: countNotMet(afterMet) },
  };
}

const countNotMet = (said: readonly Said[]): number => said.filter(({ cameNotMet }) => cameNotMet).length;

/**
 * Mean squared distance of the shares that were said from 1 (came not met) or 0. Null where nothing was said.
 *
 * Source: Brier (1950, Monthly Weather Review 78:1-3).
 *
 * @example brierScore([{ share: 0.75, wasMet: true, cameNotMet: true }, { share: 0.25, wasMet: true, cameNotMet: false }]) // => 0.0625
 */
export const brierScore = (said: readonly Said[]): number | null =>
  said.length === 0
    ? null
    : said.reduce((sum, { share, cameNotMet }) => sum + (share - (cameNotMet ? 1 : 0)) ** 2, 0) / said.length;
