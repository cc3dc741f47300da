import type { ImportQuery, ImportRow } from '../../contracts/imports.ts';
import type { Page } from '../../contracts/paging.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { listBorrowerNames } from '../db/repositories/borrowerLists.ts';
import type { PersonActor } from './actor.ts';
import { listImports } from './listImports.ts';

export interface ImportsPage {
  readonly first: Page<ImportRow>;
  /** Borrowers that the person may import for. */
  readonly borrowers: readonly { readonly id: number; readonly name: string }[];
}

export async function showImportsPage(actor: PersonActor, query: ImportQuery): Promise<ImportsPage> {
  const scope = deskScope(actor.person, 'import figures');
  const [listed, borrowers] = await Promise.all([
    listImports(actor, query),
    inTransaction((tx) => listBorrowerNames(tx, scope)),
  ]);
  if (!listed.ok) throw new Error(`imports could not be listed: ${listed.error.kind}`);
  return { first: listed.value, borrowers };
}
