import { createHash } from 'node:crypto';
import { formatDay } from '../../core/calendar/printDay.ts';
import { err, ok } from '../../core/result.ts';
import type { Transaction } from 'sequelize';
import { deskScope } from '../auth/policy.ts';
import { inTransaction, isDuplicate } from '../db/inTransaction.ts';
import { findBorrowerDesk } from '../db/repositories/borrowerDesks.ts';
import { insertFile } from '../db/repositories/files.ts';
import { findSameFile, insertImport } from '../db/repositories/imports.ts';
import type { PersonActor } from './actor.ts';
import { keepFile } from './keepFile.ts';
import { lenderDay } from './lenderDay.ts';
import { readFile, toStaged } from './readStoredFile.ts';
import { audit, write, type Outcome } from './write.ts';

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
  const { borrowerId, fileName, bytes } = file;
  const scope = deskScope(actor.person, 'import figures');
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  const { borrower, same } = await inTransaction(async (tx) => ({
    borrower: await findBorrowerDesk(tx, borrowerId, scope),
    same: await findSameFile(tx, borrowerId, sha256),
  }));
  if (!borrower) return err({ kind: 'not-found', what: 'borrower' });
  const command = { borrowerId, fileName, sha256 };
  // Whoever repeats a request whose answer was lost gets that answer; anybody else is told where the file is.
  if (same) return write(actor, 'stage-import', command, (tx) => alreadyThere(tx, borrowerId, sha256));

  const reading = await readFile({ ...file, importId: null });
  const subject = { borrowerId, deskId: borrower.deskId, before: null };
  if (reading.refusal) {
    const { code, message, where } = reading.refusal;
    await inTransaction((tx) =>
      audit(tx, actor, {
        ...subject,
        action: 'refuse-file',
        subjectKind: 'file',
        subjectId: sha256,
        summary: `Refused a file for ${borrower.name}: ${code}`,
        after: { code, where, fileName },
      }),
    );
    return err({ kind: 'refused-file', code, detail: message, errors: [{ code, message, ...where }] });
  }

  const mediaType = mediaTypeOf(bytes);
  await keepFile(bytes, mediaType);
  return write(actor, 'stage-import', command, async (tx) => {
    await insertFile(tx, { sha256, sizeBytes: bytes.length, mediaType, now: actor.now });
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
      return alreadyThere(tx, borrowerId, sha256);
    }
    await audit(tx, actor, {
      ...subject,
      action: 'stage-import',
      subjectKind: 'import',
      subjectId: String(id),
      summary: `Received ${fileName} for ${borrower.name}`,
      after: command,
    });
    return ok({ id });
  });
}

/** The content decides, as it does for the reader: what is no archive was read as text. */
const mediaTypeOf = (bytes: Buffer): string =>
  bytes.subarray(0, 2).toString('latin1') === 'PK'
    ? 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet'
    : 'text/csv';

async function alreadyThere(
  tx: Transaction,
  borrowerId: number,
  sha256: string,
): Promise<Outcome<{ id: number }>> {
  const same = await findSameFile(tx, borrowerId, sha256);
  const which = same
    ? `received as ${same.fileName} on ${formatDay(await lenderDay(tx, same.uploadedAt))} by ${same.uploadedBy} (${same.state}, import ${same.id})`
    : 'withdrawn by somebody this moment';
  return err({
    kind: 'conflict',
    detail: `This very file is here already: it was ${which}. Nothing was imported twice. Open that import, or withdraw it to read the file again.`,
  });
}
