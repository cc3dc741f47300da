import type { Transaction } from 'sequelize';
import { bookMember, type BookMember } from '../../core/bookMember.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { loadBorrowerInputs } from '../db/repositories/borrowerInputs.ts';
import { policyInForce } from '../db/repositories/policies.ts';

/** What one borrower brings to the book, as known by then. */
export async function memberOfBook(
  tx: Transaction,
  borrowerId: number,
  knownAt: Date,
  asOf: PlainDate,
): Promise<BookMember> {
  const inputs = await loadBorrowerInputs(tx, borrowerId, knownAt);
  if (!inputs) throw new Error(`there is no borrower ${borrowerId}`);
  return bookMember(inputs, await policyInForce(tx, asOf, knownAt), asOf);
}
