import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import type { PeerInputs } from '../../core/quality/crossSection.ts';
import { peerInputsOfQuarters } from '../../core/quality/peerInputs.ts';
import { loadBorrowerInputs } from '../db/repositories/borrowerInputs.ts';

/** What one borrower brings to the comparison with its peers, as known by then. */
export async function peersOfBorrower(
  tx: Transaction,
  borrowerId: number,
  knownAt: Date,
  asOf: PlainDate,
): Promise<readonly PeerInputs[]> {
  const inputs = await loadBorrowerInputs(tx, borrowerId, knownAt);
  if (!inputs) throw new Error(`there is no borrower ${borrowerId}`);
  return peerInputsOfQuarters(inputs, asOf);
}
