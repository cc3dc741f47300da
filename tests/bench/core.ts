/**
 * npm run bench: how long the core takes by itself, without database and network.
 *
 * Prints the median of one borrower's assessment and of the peers' cross-section, and how the latter grows. It asserts
 * nothing: a figure of another machine is no failure.
 */
import { performance } from 'node:perf_hooks';
import { assess } from '#core/assess.ts';
import { NO_BOOK } from '#core/bookCrossSection.ts';
import { POLICY_VERSION_1 } from '#core/policy.ts';
import { AS_OF, buildBook, generator } from '#core/quality/book.fixture.ts';
import { buildCrossSection, type PeerInputs } from '#core/quality/crossSection.ts';
import { peerInputsOfQuarters } from '#core/quality/peerInputs.ts';
import { inQuarters, inYearsToDate, QUARTERS, restated, TESTED_QUARTERS } from './heavyBorrower.ts';

const SECTORS = 40;
const PATTERNS = 80;

const patterns = buildBook(PATTERNS, 'metal goods', 1).map((borrower) =>
  peerInputsOfQuarters(borrower, AS_OF),
);

/** So many borrowers of eight quarter ends each, drawn around those that were built statement by statement. */
function peersOf(borrowers: number): PeerInputs[] {
  const random = generator(borrowers);
  return Array.from({ length: borrowers }, (_, k) => k).flatMap((borrowerId) => {
    const size = 0.5 + 3 * random();
    return patterns[borrowerId % PATTERNS]!.map((peer) => ({
      ...peer,
      borrowerId,
      sector: `sector ${borrowerId % SECTORS}`,
      figures: Object.fromEntries(
        Object.entries(peer.figures).map(([name, value]) => [name, value * size * (0.95 + random() / 10)]),
      ),
    }));
  });
}

function medianMs(runs: number, work: () => unknown): number {
  for (let warm = 0; warm < Math.min(10, runs); warm += 1) work();
  const times = Array.from({ length: runs }, () => {
    const start = performance.now();
    work();
    return performance.now() - start;
  }).sort((a, b) => a - b);
  return times[Math.floor(runs / 2)]!;
}

const say = (label: string, figure: string): void => console.log(`${label.padEnd(56)}${figure.padStart(12)}`);
const ms = (value: number): string => `${value.toFixed(2)} ms`;

const crossSection = { ...NO_BOOK, ...buildCrossSection(peersOf(1_000), 1) };

console.log(
  `One borrower: ${QUARTERS} quarters, 4 covenants, ${TESTED_QUARTERS} quarters of tests; median of 100`,
);
for (const [label, inputs] of [
  ['quarter by quarter', inQuarters],
  ['years to date', inYearsToDate],
  ['years to date, every period restated', restated],
] as const)
  say(`  assess, ${label}`, ms(medianMs(100, () => assess(inputs, crossSection, POLICY_VERSION_1, AS_OF))));
say(
  '  peer figures of the last 8 quarter ends',
  ms(medianMs(100, () => peerInputsOfQuarters(inYearsToDate, AS_OF))),
);

console.log('The cross-section of 8 quarter ends; median of 5');
const [small, large] = [1_000, 10_000].map((borrowers) => {
  const peers = peersOf(borrowers);
  const took = medianMs(5, () => buildCrossSection(peers, 1));
  say(`  ${borrowers.toLocaleString('en')} invented borrowers`, ms(took));
  return took;
});
say('  ten times the borrowers take', `${(large! / small!).toFixed(1)} times`);
