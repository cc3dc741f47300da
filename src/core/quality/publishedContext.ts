import type { PlainDate } from '../calendar/plainDate.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import type { AccountsAt } from './accountsAt.ts';
import type { QuarterCrossSection } from './crossSection.ts';
import type { PeerInputs } from './peerFigures.ts';

/** What a published measure may look at: one borrower at one quarter end. */
export interface PublishedContext {
  readonly book: StatementBook;
  readonly quarterEnd: PlainDate;
  readonly peer: PeerInputs;
  /** Null where nobody's accounts of the quarter end are in the book. */
  readonly section: QuarterCrossSection | null;
  readonly currency: string;
  /** Accounts of its own for every measure, so that one that does not tie costs only what rests on it. */
  readonly accounts: () => AccountsAt;
}
