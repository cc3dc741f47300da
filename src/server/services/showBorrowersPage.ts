import type { BorrowerQuery, BorrowerRow } from '../../contracts/borrowers.ts';
import type { Page } from '../../contracts/paging.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { listSectors } from '../db/repositories/sectors.ts';
import type { PersonActor } from './actor.ts';
import { listBorrowers } from './listBorrowers.ts';

export interface BorrowersPage {
  readonly first: Page<BorrowerRow>;
  readonly sectors: readonly { readonly code: string; readonly label: string }[];
}

export async function showBorrowersPage(actor: PersonActor, query: BorrowerQuery): Promise<BorrowersPage> {
  const [listed, sectors] = await Promise.all([
    listBorrowers(actor, query),
    inTransaction((tx) => listSectors(tx)),
  ]);
  if (!listed.ok) throw new Error(`borrowers could not be listed: ${listed.error.kind}`);
  return { first: listed.value, sectors: sectors.map(({ code, label }) => ({ code, label })) };
}
