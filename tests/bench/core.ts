/**
 * npm run bench: how long the core takes by itself, without database and network, on one thread.
 *
 * Prints the median of one borrower's assessment, what one quarter end of a whole book takes, how that grows with the
 * book, and what it holds in memory. It asserts nothing: a figure of another machine is no failure.
 */
import { performance } from 'node:perf_hooks';
import { assess } from '#core/assess.ts';
import { NO_BOOK } from '#core/bookCrossSection.ts';
import { patternStanding } from '#core/patterns/patternStanding.ts';
import { POLICY_VERSION_1 } from '#core/policy.ts';
import { AS_OF } from '#core/quality/book.fixture.ts';
import { buildCrossSection } from '#core/quality/crossSection.ts';
import { peerInputsOfQuarters } from '#core/quality/peerInputs.ts';
import { inQuarters, inYearsToDate, QUARTERS, restated, TESTED_QUARTERS } from './heavyBorrower.ts';
import { peersOf, testsOf, TESTS } from './wholeBook.ts';

const RUNS = 200;
const BOOK_RUNS = 5;
const SIZES = [1_000, 10_000] as const;
const MEBIBYTE = 2 ** 20;

function medianMs(runs: number, work: () => unknown): number {
  for (let warm = 0; warm < Math.min(50, runs); warm += 1) work();
  const times = Array.from({ length: runs }, () => {
    const start = performance.now();
    work();
    return performance.now() - start;
  }).sort((a, b) => a - b);
  return times[Math.floor(runs / 2)]!;
}

const say = (label: string, figure: string): void => console.log(`${label.padEnd(64)}${figure.padStart(12)}`);
const ms = (value: number): string => `${value.toFixed(2)} ms`;
const times = (large: number, small: number): string => `${(large / small).toFixed(1)} times`;

/** What is held in memory by what `make` gives, after everything else is cleared away. */
function heldMebibytes(make: () => unknown): number {
  if (!globalThis.gc) throw new Error('run with --expose-gc, as npm run bench does');
  globalThis.gc();
  const before = process.memoryUsage().heapUsed;
  const made = make();
  globalThis.gc();
  const held = process.memoryUsage().heapUsed - before;
  // Read after the measurement, so that it is still held during it.
  if (made === undefined) throw new Error('nothing was made');
  return held / MEBIBYTE;
}

function oneBorrower(): void {
  console.log(
    `One borrower: ${QUARTERS} quarters, 4 covenants, ${TESTED_QUARTERS} quarters of tests; median of ${RUNS}; wanted: 4 ms`,
  );
  const book = {
    ...NO_BOOK,
    ...buildCrossSection(peersOf(1_000), 1),
    patterns: patternStanding(testsOf(1_000, 4)),
  };
  for (const [label, inputs] of [
    ['quarter by quarter', inQuarters],
    ['years to date', inYearsToDate],
    ['years to date, every period restated', restated],
  ] as const)
    say(`  assess, ${label}`, ms(medianMs(RUNS, () => assess(inputs, book, POLICY_VERSION_1, AS_OF))));
  say(
    '  of that, figures for peers of 8 quarter ends',
    ms(medianMs(RUNS, () => peerInputsOfQuarters(inYearsToDate, AS_OF))),
  );
}

function wholeBook(): void {
  console.log(
    `One quarter end of the whole book: peer models, and the patterns of ${TESTS} tests a covenant; median of ${BOOK_RUNS}; wanted: 2 s for 10,000`,
  );
  const taken = SIZES.map((borrowers) => {
    const peers = peersOf(borrowers);
    const [one, four] = [testsOf(borrowers, 1), testsOf(borrowers, 4)];
    const models = medianMs(BOOK_RUNS, () => buildCrossSection(peers, 1));
    const oneCovenant = medianMs(BOOK_RUNS, () => patternStanding(one));
    const fourCovenants = medianMs(BOOK_RUNS, () => patternStanding(four));
    const held = heldMebibytes(() => [buildCrossSection(peers, 1), patternStanding(four)]);
    const name = `  ${borrowers.toLocaleString('en')} borrowers`;
    say(`${name}: peer models`, ms(models));
    say(`${name}: patterns, one covenant each`, ms(oneCovenant));
    say(`${name}: patterns, four covenants each`, ms(fourCovenants));
    say(`${name}: together, one covenant each`, ms(models + oneCovenant));
    say(`${name}: together, four covenants each`, ms(models + fourCovenants));
    say(`${name}: held in memory`, `${held.toFixed(1)} MiB`);
    return { took: models + oneCovenant, held };
  });
  const [small, large] = taken;
  say('  ten times the borrowers take', times(large!.took, small!.took));
  say('  ten times the borrowers hold', times(large!.held, small!.held));
}

oneBorrower();
wholeBook();
