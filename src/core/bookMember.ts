/** What one borrower brings to the book, by night, before anybody is compared: plain JSON. */
import type { BorrowerInputs } from './borrowerInputs.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import { allTests } from './allTests.ts';
import { resetDates } from './covenants/levels.ts';
import { ratioSeries, type RatioSeries } from './outlook/ratioSeries.ts';
import { headroomRows, type HeadroomRow } from './patterns/headroomRow.ts';
import { statementDigits, type StatementDigits } from './patterns/statementDigits.ts';
import type { Policy } from './policy.ts';
import { peerInputsFrom } from './quality/peerInputs.ts';
import type { PeerInputs } from './quality/peerFigures.ts';
import { openBooks } from './statements/statementBook.ts';

export interface BookMember {
  readonly borrowerId: number;
  readonly peers: readonly PeerInputs[];
  readonly headrooms: readonly HeadroomRow[];
  readonly ratios: readonly RatioSeries[];
  readonly digits: StatementDigits;
}

/**
 * The figures for peers, the headroom of every test, and the ratios' course. The desk's own triggers are no promise
 * of the borrower, so they bring no headroom to the patterns.
 *
 * @example bookMember(inputs, POLICY_VERSION_1, '2026-11-30').peers.length // => 8
 */
export function bookMember(inputs: BorrowerInputs, policy: Policy, asOf: PlainDate): BookMember {
  const { borrowerId, sector, covenants } = inputs;
  const books = openBooks(inputs, asOf);
  const tests = allTests(inputs, books, policy, asOf);
  const byCovenant = covenants.map((covenant) => ({
    covenant,
    own: tests.filter(({ covenantId }) => covenantId === covenant.id),
  }));
  return {
    borrowerId,
    peers: peerInputsFrom(inputs, books),
    headrooms: byCovenant
      .filter(({ covenant }) => !covenant.isOurs)
      .flatMap(({ covenant, own }) =>
        headroomRows({
          borrowerId,
          sector,
          roundingPlaces: covenant.roundingPlaces,
          tests: own,
          resetOn: resetDates(covenant),
          curedOn: new Set(covenant.cures.map(({ quarterEnd }) => quarterEnd)),
        }),
      ),
    ratios: byCovenant.flatMap(
      ({ covenant, own }) => ratioSeries({ borrowerId, sector }, own, books[covenant.scope]) ?? [],
    ),
    digits: statementDigits(Object.values(books).flatMap(({ current }) => current)),
  };
}
