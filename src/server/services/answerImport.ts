import type { ImportAnswer } from '../../contracts/imports.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import type { Question, Reading } from '../../contracts/reading.ts';
import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { insertAnswer, listAnswers, undoAnswer } from '../db/repositories/importAnswers.ts';
import {
  findImport,
  findImportForUpdate,
  updateReading,
  type ImportRecord,
} from '../db/repositories/imports.ts';
import type { PersonActor } from './actor.ts';
import { readFile, storedBytes, toStaged } from './readStoredFile.ts';
import { audit, write, type Outcome } from './write.ts';

interface Answered {
  readonly id: number;
  readonly version: number;
}

/**
 * Reads the file anew with all answers and this one (or without it, where it is taken back), then records both in one
 * transaction. Another answer that came in between has moved the version, so that the two cannot mix.
 */
export async function answerImport(
  actor: PersonActor,
  { id, version }: Answered,
  command: ImportAnswer,
): Promise<Outcome<Answered>> {
  const scope = deskScope(actor.person, 'import figures');
  const { seen, given } = await inTransaction(async (tx) => ({
    seen: await findImport(tx, id, scope),
    given: await listAnswers(tx, id),
  }));
  if (!seen) return err({ kind: 'not-found', what: 'import' });
  const isAsSeen = seen.state === 'draft' && seen.version === version;
  const reading = isAsSeen ? await readWith(seen, command) : null;

  return write(actor, 'answer-import', { id, version, command }, async (tx) => {
    const draft = await findImportForUpdate(tx, id, scope);
    if (!draft) return err({ kind: 'not-found', what: 'import' });
    if (draft.state !== 'draft')
      return err({ kind: 'conflict', detail: `This import is ${draft.state}. Nothing was changed.` });
    if (!reading || draft.version !== version) return err(stale(draft.version));
    const earlier = given.find((answer) => answer.questionKey === command.questionKey);
    const holdsFor = questionOf(JSON.parse(draft.reading) as Reading, command)?.holdsFor ?? earlier?.holdsFor;
    const refused = refusal(reading, command, holdsFor);
    if (refused) return err(refused);

    const about = { importId: draft.id, questionKey: command.questionKey, now: actor.now };
    await undoAnswer(tx, about);
    if (command.answer !== null && holdsFor)
      await insertAnswer(tx, { ...about, holdsFor, answer: command.answer, personId: actor.person.id });
    if (!(await updateReading(tx, { ...toStaged(reading), id, version }))) return err(stale(draft.version));
    await audit(tx, actor, {
      action: 'answer-import',
      subjectKind: 'import',
      subjectId: String(draft.id),
      borrowerId: draft.borrowerId,
      deskId: draft.deskId,
      summary: `${command.answer === null ? 'Took back an answer' : 'Answered'} on ${draft.fileName}: ${command.questionKey}`,
      before: earlier ? { answer: earlier.answer } : null,
      after: command,
    });
    return ok({ id, version: version + 1 });
  });
}

const readWith = async (draft: ImportRecord, answering: ImportAnswer): Promise<Reading> =>
  readFile({
    borrowerId: draft.borrowerId,
    bytes: await storedBytes(draft.sha256),
    fileName: draft.fileName,
    importId: draft.id,
    answering,
  });

const questionOf = (reading: Reading, { questionKey }: ImportAnswer): Question | undefined =>
  reading.questions.find((question) => question.key === questionKey);

function refusal(
  reading: Reading,
  command: ImportAnswer,
  holdsFor: Question['holdsFor'] | undefined,
): ServiceProblem | null {
  if (reading.refusal) {
    const { code, message, where } = reading.refusal;
    return { kind: 'refused-file', code, detail: message, errors: [{ code, message, ...where }] };
  }
  if (!holdsFor) return invalid('questionKey', 'This file does not ask that.');
  const asked = questionOf(reading, command);
  if (command.answer !== null && asked && asked.answer !== command.answer)
    return invalid('answer', 'That is none of the answers to this question.');
  return null;
}

const invalid = (field: string, message: string): ServiceProblem => ({
  kind: 'invalid',
  detail: `${message} Nothing was changed.`,
  errors: [{ field, code: 'invalid', message }],
});

const stale = (currentVersion: number): ServiceProblem => ({
  kind: 'stale',
  detail:
    'Somebody answered on this import since you opened it. Nothing was changed. Look at the questions again.',
  currentVersion,
});
