import { createHash } from 'node:crypto';
import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction, isDuplicate } from '../db/inTransaction.ts';
import { findBorrowerDesk } from '../db/repositories/borrowerDesks.ts';
import { insertFile } from '../db/repositories/files.ts';
import { findSameFile, insertImport } from '../db/repositories/imports.ts';
import type { PersonActor } from './actor.ts';
import { keepFile } from './keepFile.ts';
import { readFile, toStaged } from './readStoredFile.ts';
import { audit, write, type Outcome } from './write.ts';

const WORKBOOK = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

export interface UploadedFile {
  readonly borrowerId: number;
  readonly fileName: string;
  readonly bytes: Buffer;
}

/**
 * Keeps the file and what it was read as, as a draft: no figure counts until it is accepted. A file that cannot
 * be read leaves nothing but an audit entry; the same bytes for the same borrower lead to the import there is.
 */
export async function stageImport(actor: PersonActor, file: UploadedFile): Promise<Outcome<{ id: number }>> {
  const scope = deskScope(actor.person, 'import figures');
  const sha256 = createHash('sha256').update(file.bytes).digest('hex');
  const looked = await inTransaction(async (tx) => ({
    borrower: await findBorrowerDesk(tx, file.borrowerId, scope),
    same: await findSameFile(tx, file.borrowerId, sha256),
  }));
  const { borrower } = looked;
  if (!borrower) return err({ kind: 'not-found', what: 'borrower' });
  if (looked.same && actor.idempotencyKey === null) return alreadyThere(looked.same);

  const { reading } = await readFile({ ...file, importId: null });
  const subject = {
    subjectKind: 'file',
    subjectId: sha256,
    borrowerId: borrower.id,
    deskId: borrower.deskId,
    before: null,
  };
  if (reading.refusal) {
    const { code, message, where } = reading.refusal;
    await inTransaction((tx) =>
      audit(tx, actor, {
        ...subject,
        action: 'refuse-file',
        summary: `Refused a file for ${borrower.name}: ${code}`,
        after: { code, where, fileName: file.fileName },
      }),
    );
    return err({ kind: 'refused-file', code, detail: message, errors: [{ code, message, ...where }] });
  }

  await keepFile(file.bytes, WORKBOOK);
  const command = { borrowerId: borrower.id, fileName: file.fileName, sha256 };
  return write(actor, 'stage-import', command, async (tx) => {
    await insertFile(tx, { sha256, sizeBytes: file.bytes.length, mediaType: WORKBOOK, now: actor.now });
    let id: number;
    try {
      id = await insertImport(tx, {
        ...toStaged(reading),
        ...command,
        uploadedBy: actor.person.id,
        now: actor.now,
      });
    } catch (error) {
      if (!isDuplicate(error)) throw error;
      const same = await findSameFile(tx, borrower.id, sha256);
      return alreadyThere(same);
    }
    await audit(tx, actor, {
      ...subject,
      subjectKind: 'import',
      subjectId: String(id),
      action: 'stage-import',
      summary: `Received ${file.fileName} for ${borrower.name}`,
      after: command,
    });
    return ok({ id });
  });
}

function alreadyThere(same: Awaited<ReturnType<typeof findSameFile>>) {
  const which = same
    ? `as ${same.fileName} on ${same.uploadedAt.toISOString().slice(0, 10)} by ${same.uploadedBy} (${same.state}, import ${same.id})`
    : 'by somebody else this moment';
  return err({
    kind: 'conflict' as const,
    detail: `This very file is here already: it was received ${which}. Nothing was imported twice. Open that import, or withdraw it to read the file again.`,
  });
}
