import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { raiseInputVersion } from '../db/repositories/borrowers.ts';
import { findImportForUpdate, markWithdrawn } from '../db/repositories/imports.ts';
import { endStatementsOfImport } from '../db/repositories/statementEnds.ts';
import type { PersonActor } from './actor.ts';
import { assessNow } from './assessNow.ts';
import { audit, write, type Outcome } from './write.ts';

/** Takes an import back: its figures no longer count, what was on file before it does again, and all of it stays on record. */
export async function withdrawImport(
  actor: PersonActor,
  request: { id: number; version: number },
): Promise<Outcome<{ id: number }>> {
  const scope = deskScope(actor.person, 'import figures');
  let assessed: number | null = null;
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
      assessed = record.borrowerId;
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
    return ok({ id: record.id });
  });
  if (done.ok && assessed !== null) await assessNow(actor, assessed);
  return done;
}
