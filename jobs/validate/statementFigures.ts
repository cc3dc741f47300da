/** The figures of all simulated books of statements together. */
import type { MeasuredArea, Spread, ValidationFigures } from '#contracts/validation.ts';
import { CHANNELS, QUARTERS } from './firmPlan.ts';
import { flagsBeyond, flagsOfWorstTenth } from './flagCounts.ts';
import { areaOf, lowHeadline, lowScore, type JudgedFirm, type StatementResult } from './statementResults.ts';

type Suspicion = (firm: JudgedFirm) => number | null | undefined;

export function statementFigures(results: readonly StatementResult[]): ValidationFigures['statementBooks'] {
  const [first] = results;
  if (!first) throw new RangeError('statementFigures needs at least one book');
  const measured = (name: string, suspicion: Suspicion): MeasuredArea => ({
    name,
    area: areaSpread(results, suspicion),
    worstTenth: flagsOfWorstTenth(results, suspicion),
  });
  const measures = Object.keys(first.firms[0]!.measures)
    .map((name) => measured(name, (firm) => firm.measures[name]))
    .sort((a, b) => b.area.mean - a.area.mean);
  const honest = results.flatMap(({ firms }) => firms).filter(({ lifting }) => lifting === null);
  return {
    firms: first.firms.length,
    lifters: first.firms.filter(({ lifting }) => lifting !== null).length,
    quarters: QUARTERS,
    score: measured('score of one quarter end', lowScore),
    headline: measured('headline of three quarter ends', lowHeadline),
    measures,
    blocks: blockNames(results).map((name) => ({
      name,
      area: areaSpread(results, (firm) => firm.blocks[name]),
    })),
    byChannel: CHANNELS.map((channel) => partArea(results, channel, ({ channel: own }) => own === channel)),
    byQuartersIn: QUARTERS_IN.map(({ from, to }) =>
      partArea(
        results,
        `${from} to ${to} quarters in`,
        ({ quartersIn }) => quartersIn >= from && quartersIn <= to,
      ),
    ),
    lines: LINES.map(({ test, suspicion, beyond }) => flagsBeyond(results, test, suspicion, beyond)),
    quarterlyMove: {
      score: rootMeanSquare(honest.map(({ score, scoreBefore }) => change(score, scoreBefore))),
      headline: rootMeanSquare(
        honest.map(({ headline, headlineBefore }) => change(headline, headlineBefore)),
      ),
    },
    withoutScore: shareOf(results, ({ score }) => score === null),
  };
}

/** How long the lifting has gone on by the quarter that is judged. */
const QUARTERS_IN = [
  { from: 2, to: 3 },
  { from: 4, to: 6 },
  { from: 7, to: 9 },
];

/** Published lines, and the product's: below 30 is the weakest band. */
const LINES: readonly { readonly test: string; readonly suspicion: Suspicion; readonly beyond: number }[] = [
  {
    test: 'M-score above -1.78',
    suspicion: ({ measures }) => measures['M-score, eight variables'],
    beyond: -1.78,
  },
  { test: 'F-score above 1', suspicion: ({ measures }) => measures['F-score'], beyond: 1 },
  { test: 'F-score above 1.85', suspicion: ({ measures }) => measures['F-score'], beyond: 1.85 },
  { test: 'score below 30', suspicion: lowScore, beyond: -30 },
  { test: 'headline below 30', suspicion: lowHeadline, beyond: -30 },
];

const blockNames = (results: readonly StatementResult[]): readonly string[] => [
  ...new Set(results.flatMap(({ firms }) => firms.flatMap(({ blocks }) => Object.keys(blocks)))),
];

/** The score's area among those lifting firms that are meant and all honest ones. */
function partArea(
  results: readonly StatementResult[],
  name: string,
  isMeant: (lifting: NonNullable<JudgedFirm['lifting']>) => boolean,
): { readonly name: string; readonly area: Spread } {
  const parts = results
    .map(({ seed, firms }) => ({
      seed,
      firms: firms.filter(({ lifting }) => lifting === null || isMeant(lifting)),
    }))
    // A book may have nobody of the kind.
    .filter(({ firms }) => firms.some(({ lifting }) => lifting !== null));
  return { name, area: areaSpread(parts, lowScore) };
}

const areaSpread = (results: readonly StatementResult[], suspicion: Suspicion): Spread =>
  spreadOf(results.map(({ firms }) => areaOf(firms, suspicion)));

function spreadOf(values: readonly number[]): Spread {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return {
    mean,
    deviation: values.length > 1 ? Math.sqrt(squares / (values.length - 1)) : 0,
    least: Math.min(...values),
    most: Math.max(...values),
  };
}

const change = (now: number | null, before: number | null): number | null =>
  now === null || before === null ? null : now - before;

function rootMeanSquare(changes: readonly (number | null)[]): number {
  const known = changes.filter((each) => each !== null);
  return Math.sqrt(known.reduce((sum, each) => sum + each * each, 0) / known.length);
}

function shareOf(results: readonly StatementResult[], isMeant: (firm: JudgedFirm) => boolean): number {
  const firms = results.flatMap(({ firms: own }) => own);
  return firms.filter(isMeant).length / firms.length;
}
