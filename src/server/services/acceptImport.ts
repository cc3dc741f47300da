import type { Transaction } from 'sequelize';
import type { AcceptedImport, ChangedFigure, ImportAcceptance } from '../../contracts/imports.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import type { Reading } from '../../contracts/reading.ts';
import { LINE_ITEM_CODES } from '../../core/statements/lineItems.ts';
import type { Statement } from '../../core/statements/statement.ts';
import { statementsFromReading, type StagedStatement } from '../../core/statements/statementsFromReading.ts';
import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { rememberAnswer, listAnswers } from '../db/repositories/importAnswers.ts';
import { findImportForUpdate, markAccepted, type ImportRecord } from '../db/repositories/imports.ts';
import { raiseInputVersion } from '../db/repositories/borrowers.ts';
import { loadStatements } from '../db/repositories/statementInputs.ts';
import { insertStatementVersions, type DeliveredStatement } from '../db/repositories/statements.ts';
import type { PersonActor } from './actor.ts';
import { assessNow } from './assessNow.ts';
import { lenderDay } from './lenderDay.ts';
import { audit, write, type Outcome } from './write.ts';

/**
 * Makes statement versions of a draft that has no open question, in one transaction, and assesses the borrower at
 * once. Figures on file that are the same stay as they are; others are superseded by a new version, never overwritten.
 */
export async function acceptImport(
  actor: PersonActor,
  request: { id: number; version: number },
  command: ImportAcceptance,
): Promise<Outcome<AcceptedImport>> {
  const scope = deskScope(actor.person, 'import figures');
  const accepted = await write(actor, 'accept-import', { ...request, command }, async (tx) => {
    const draft = await findImportForUpdate(tx, request.id, scope);
    if (!draft) return err({ kind: 'not-found', what: 'import' });
    const reading = JSON.parse(draft.reading) as Reading;
    const refused = refusal(draft, request.version, reading);
    if (refused) return err(refused);
    const { added, unchanged, changes } = await addVersions(tx, actor, draft, reading, command);
    if (added === 0)
      return err({
        kind: 'conflict',
        detail:
          'All periods of this file are on file with equal figures. Nothing was changed. Withdraw this import if it is not needed.',
      });
    if (!(await markAccepted(tx, { ...request, ...command, acceptedBy: actor.person.id, now: actor.now })))
      return err(stale(draft));
    await raiseInputVersion(tx, draft.borrowerId);
    await rememberAnswers(tx, actor, draft, reading.layoutKey);
    await audit(tx, actor, {
      action: 'accept-import',
      subjectKind: 'import',
      subjectId: String(draft.id),
      borrowerId: draft.borrowerId,
      deskId: draft.deskId,
      summary: `Accepted ${added === 1 ? 'one statement' : `${added} statements`} of ${draft.borrowerName} from ${draft.fileName}`,
      before: { state: draft.state },
      after: { ...command, statements: added, unchanged, changes },
    });
    return ok({ id: draft.id, borrowerId: draft.borrowerId, statements: added, unchanged, changes });
  });
  if (accepted.ok) await assessNow(actor, accepted.value.borrowerId);
  return accepted;
}

const stale = (draft: ImportRecord): ServiceProblem => ({
  kind: 'stale',
  detail: 'This import changed since you opened it. Nothing was changed. Look at it again and accept.',
  currentVersion: draft.version,
});

function refusal(draft: ImportRecord, version: number, reading: Reading): ServiceProblem | null {
  if (draft.state === 'accepted')
    return {
      kind: 'conflict',
      detail: `${draft.acceptedBy ?? 'Somebody'} accepted this import already. Its figures were taken once; nothing was changed.`,
    };
  if (draft.state !== 'draft')
    return { kind: 'conflict', detail: `This import is ${draft.state}. Nothing was changed.` };
  if (draft.version !== version) return stale(draft);
  if (reading.outcome !== 'ready')
    return {
      kind: 'conflict',
      detail: `${openQuestions(draft.openQuestions)} Nothing was changed.`,
    };
  return null;
}

const openQuestions = (open: number): string =>
  open === 0
    ? 'The answer was to wait for a corrected file. Change it to take these figures, or withdraw this import.'
    : `${open === 1 ? 'One question is' : `${open} questions are`} open. Answer them, then accept.`;

async function addVersions(
  tx: Transaction,
  actor: PersonActor,
  draft: ImportRecord,
  reading: Reading,
  command: ImportAcceptance,
) {
  const known = (await loadStatements(tx, [draft.borrowerId], actor.now)).get(draft.borrowerId) ?? [];
  const onFile = known.filter(({ basis, scope }) => basis === command.basis && scope === command.scope);
  const receivedOn = await lenderDay(tx, draft.uploadedAt);
  const added: DeliveredStatement[] = [];
  let unchanged = 0;
  const changes: ChangedFigure[] = [];
  for (const staged of statementsFromReading(reading)) {
    // Versions of a period come in their order: the last is the latest.
    const earlier = onFile.findLast(
      (statement) => statement.periodEnd === staged.periodEnd && statement.months === staged.months,
    );
    const differing = earlier ? differences(earlier, staged) : [];
    if (earlier && differing.length === 0 && earlier.currency === staged.currency) {
      unchanged += 1;
      continue;
    }
    changes.push(...differing);
    added.push({ ...staged, receivedOn });
  }
  const origin = {
    ...command,
    borrowerId: draft.borrowerId,
    importId: draft.id,
    framework: known.at(-1)?.framework ?? 'not stated',
    knownFrom: actor.now,
  };
  await insertStatementVersions(tx, origin, added);
  return { added: added.length, unchanged, changes };
}

/** Lines that this file states otherwise than the version on file; a line that it leaves out says nothing. */
function differences(earlier: Statement, staged: StagedStatement): ChangedFigure[] {
  return LINE_ITEM_CODES.flatMap((line) => {
    const before = earlier.amounts[line];
    const after = staged.amounts[line];
    if (!after || (before && before.equals(after))) return [];
    return [
      {
        line,
        periodEnd: staged.periodEnd,
        months: staged.months,
        onFile: before?.toFixed() ?? 'missing',
        inThisFile: after.toFixed(),
      },
    ];
  });
}

/** Answers about the layout hold for later files of it; answers about these figures do not. */
async function rememberAnswers(
  tx: Transaction,
  actor: PersonActor,
  { id, borrowerId }: ImportRecord,
  layoutKey: string,
): Promise<void> {
  for (const { questionKey, answer, holdsFor } of await listAnswers(tx, id)) {
    if (holdsFor !== 'layout') continue;
    await rememberAnswer(tx, {
      borrowerId,
      layoutKey,
      questionKey,
      answer,
      personId: actor.person.id,
      now: actor.now,
    });
  }
}
