import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { raiseInputVersion } from '../db/repositories/borrowers.ts';
import { findImportForUpdate, markWithdrawn } from '../db/repositories/imports.ts';
import { endStatementsOfImport } from '../db/repositories/statementEnds.ts';
import type { PersonActor } from './actor.ts';
import { assessNow } from './assessNow.ts';
import { audit, write, type Outcome } from './write.ts';

export interface WithdrawnImport {
  readonly id: number;
  readonly borrowerId: number;
  /** Its figures had been accepted, so that the borrower is assessed without them. */
  readonly hadCounted: boolean;
}

/** Takes an import back: its figures no longer count, what was on file before it does again, and all of it stays on record. */
export async function withdrawImport(
  actor: PersonActor,
  request: { id: number; version: number },
): Promise<Outcome<WithdrawnImport>> {
  const scope = deskScope(actor.person, 'import figures');
  const done = await write(actor, 'withdraw-import', request, async (tx) => {
    const record = await findImportForUpdate(tx, request.id, scope);
    if (!record) return err({ kind: 'not-found', what: 'import' });
    if (record.state === 'withdrawn')
      return err({ kind: 'conflict', detail: 'This import is withdrawn already. Nothing was changed.' });
    if (!(await markWithdrawn(tx, request)))
      return err({
        kind: 'stale',
        detail: 'This import changed since you opened it. Nothing was changed. Look again.',
        currentVersion: record.version,
      });
    if (record.state === 'accepted') {
      await endStatementsOfImport(tx, { importId: record.id, now: actor.now });
      await raiseInputVersion(tx, record.borrowerId);
    }
    await audit(tx, actor, {
      action: 'withdraw-import',
      subjectKind: 'import',
      subjectId: String(record.id),
      borrowerId: record.borrowerId,
      deskId: record.deskId,
      summary: `Withdrew ${record.fileName} of ${record.borrowerName}`,
      before: { state: record.state },
      after: { state: 'withdrawn' },
    });
    return ok({ id: record.id, borrowerId: record.borrowerId, hadCounted: record.state === 'accepted' });
  });
  if (done.ok && done.value.hadCounted) await assessNow(actor, done.value.borrowerId);
  return done;
}
