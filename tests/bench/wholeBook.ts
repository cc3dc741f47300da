/** An invented whole book of any size: what every borrower brings to one quarter end, and its tests near their limits. */
import type { MeasureCode } from '#core/measures/measure.ts';
import { buildBook as buildTests } from '#core/patterns/headroomBook.fixture.ts';
import type { HeadroomRow } from '#core/patterns/headroomRow.ts';
import { AS_OF, buildBook, generator } from '#core/quality/book.fixture.ts';
import type { PeerInputs } from '#core/quality/crossSection.ts';
import { peerInputsOfQuarters } from '#core/quality/peerInputs.ts';

const SECTORS = 40;
const PATTERNS = 80;
export const TESTS = 16;

const patterns = buildBook(PATTERNS, 'metal goods', 1).map((borrower) =>
  peerInputsOfQuarters(borrower, AS_OF).at(-1)!,
);

/** So many borrowers at one quarter end, drawn around those that were built statement by statement. */
export function peersOf(borrowers: number): PeerInputs[] {
  const random = generator(borrowers);
  return Array.from({ length: borrowers }, (_, borrowerId) => {
    const size = 0.5 + 3 * random();
    const peer = patterns[borrowerId % PATTERNS]!;
    return {
      ...peer,
      borrowerId,
      sector: `sector ${borrowerId % SECTORS}`,
      figures: Object.fromEntries(
        Object.entries(peer.figures).map(([name, value]) => [name, value * size * (0.95 + random() / 10)]),
      ),
    };
  });
}

const MEASURES: readonly MeasureCode[] = [
  'net-leverage',
  'interest-cover',
  'total-leverage',
  'current-ratio',
];

/** So many covenants of each borrower, each tested sixteen times; a fifth of the borrowers lift. */
export const testsOf = (borrowers: number, covenants: number): HeadroomRow[] =>
  MEASURES.slice(0, covenants).flatMap((measure, k) =>
    buildTests({ seed: k + 1, borrowers, quarters: TESTS, lifters: 0.2, lifting: 0.4 }).map((row) => ({
      ...row,
      measure,
      sector: `sector ${row.borrowerId % SECTORS}`,
      covenantId: k * borrowers + row.borrowerId,
    })),
  );
