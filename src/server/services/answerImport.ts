import type { ImportAnswer } from '../../contracts/imports.ts';
import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { insertAnswer, undoAnswer } from '../db/repositories/importAnswers.ts';
import { findImport, findImportForUpdate, updateReading } from '../db/repositories/imports.ts';
import type { PersonActor } from './actor.ts';
import { readFile, storedBytes, toStaged } from './readStoredFile.ts';
import { audit, write, type Outcome } from './write.ts';

/** Records one answer (or takes it back) and reads the file anew with all of them. */
export async function answerImport(
  actor: PersonActor,
  request: { id: number; version: number },
  command: ImportAnswer,
): Promise<Outcome<{ id: number; version: number }>> {
  const scope = deskScope(actor.person, 'import figures');
  const recorded = await write(actor, 'answer-import', { ...request, command }, async (tx) => {
    const draft = await findImportForUpdate(tx, request.id, scope);
    if (!draft) return err({ kind: 'not-found', what: 'import' });
    if (draft.state !== 'draft')
      return err({ kind: 'conflict', detail: `This import is ${draft.state}. Nothing was changed.` });
    if (draft.version !== request.version)
      return err({
        kind: 'stale',
        detail:
          'Somebody answered on this import since you opened it. Nothing was changed. Look at the questions again.',
        currentVersion: draft.version,
      });
    const about = { importId: draft.id, questionKey: command.questionKey, now: actor.now };
    await undoAnswer(tx, about);
    if (command.answer !== null)
      await insertAnswer(tx, { ...about, answer: command.answer, personId: actor.person.id });
    await audit(tx, actor, {
      action: 'answer-import',
      subjectKind: 'import',
      subjectId: String(draft.id),
      borrowerId: draft.borrowerId,
      deskId: draft.deskId,
      summary:
        command.answer === null
          ? `Took back an answer on ${draft.fileName}: ${command.questionKey}`
          : `Answered on ${draft.fileName}: ${command.questionKey}`,
      before: null,
      after: command,
    });
    return ok({ id: draft.id });
  });
  if (!recorded.ok) return recorded;
  return ok({ id: request.id, version: await readAgain(request.id) });
}

/**
 * The answer is on record before the file is read, so that a slow or failed reading loses nothing. Where somebody
 * else's answer came in between, the file is read once more with both.
 */
async function readAgain(id: number): Promise<number> {
  for (;;) {
    const draft = await inTransaction((tx) => findImport(tx, id, 'all'));
    if (!draft) throw new Error(`import ${id} went away`);
    if (draft.state !== 'draft') return draft.version;
    const bytes = await storedBytes(draft.sha256);
    const { reading } = await readFile({
      borrowerId: draft.borrowerId,
      bytes,
      fileName: draft.fileName,
      importId: id,
    });
    const staged = toStaged(reading);
    // A repeat of an answered request finds the reading that the first one made.
    if (staged.reading === draft.reading) return draft.version;
    const updated = await inTransaction((tx) => updateReading(tx, { ...staged, id, version: draft.version }));
    if (updated) return draft.version + 1;
  }
}
