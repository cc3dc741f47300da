/** One alert's life: read under lock, moved with its version, every move an event and a change of the desk. */
import type { Transaction } from 'sequelize';
import type { AlertState, Severity } from '../../../core/alerts/alert.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { execute, selectOne } from '../sql.ts';

export interface AlertRecord {
  readonly id: number;
  readonly version: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskId: number;
  readonly deskHeadId: number | null;
  readonly kind: string;
  readonly severity: Severity;
  readonly state: AlertState;
  readonly ownerId: number;
  readonly takenBy: number | null;
  readonly putOffCount: number;
}

type AlertPlace = Pick<AlertRecord, 'borrowerId' | 'borrowerName' | 'deskId' | 'deskHeadId'>;

/** As it is now, held until the transaction ends; its borrower and desk are not held, so that others go on. */
export async function findAlertForUpdate(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<AlertRecord | null> {
  const alert = await selectOne<Omit<AlertRecord, keyof AlertPlace>>(
    tx,
    `select id, version, kind, severity, state, owner_id as ownerId, taken_by as takenBy, put_off_count as putOffCount
     from alerts where id = :id for update`,
    { id },
  );
  const desks = inScope(scope);
  const place = await selectOne<AlertPlace>(
    tx,
    `select b.id as borrowerId, b.name as borrowerName, b.desk_id as deskId, d.head_id as deskHeadId
     from alerts a join borrowers b on b.id = a.borrower_id join desks d on d.id = b.desk_id
     where a.id = :id and ${desks.sql}`,
    { id, ...desks.values },
  );
  return alert && place && { ...alert, ...place };
}

export interface AlertMove {
  readonly alert: Pick<AlertRecord, 'id' | 'version' | 'deskId'>;
  readonly state: AlertState;
  readonly personId: number;
  readonly what: string;
  readonly text: string;
  readonly now: Date;
  /** Left out: whoever took it has it still. */
  readonly takenBy?: number;
  readonly putOffUntil?: string;
  /** Asked for by the person; left out where a closing asked for before is confirmed, or is not. */
  readonly closing?: { readonly reason: number; readonly text: string };
}

/**
 * False where the version has moved on, or where whoever asked for the closing would confirm it. Closing an alert
 * frees its slot, so that later facts may raise another.
 */
export async function moveAlert(tx: Transaction, move: AlertMove): Promise<boolean> {
  const changeNumber = await nextChange(tx, move.alert.deskId);
  const ends = move.state === 'closed';
  const { affectedRows } = await execute(
    tx,
    `update alerts set state = :state, change_number = :changeNumber, version = version + 1,
       taken_by = coalesce(:takenBy, taken_by), taken_at = if(:takenBy is null, taken_at, :now),
       put_off_until = :putOffUntil, put_off_count = put_off_count + if(:putOffUntil is null, 0, 1),
       closing_reason = if(:ends, coalesce(:reason, closing_reason), :reason),
       closing_text = if(:ends, coalesce(:closingText, closing_text), :closingText),
       closed_by = if(:reason is not null, :personId, if(:ends, closed_by, null)),
       closed_at = if(:ends, :now, null), open_slot = if(:ends, null, open_slot)
     where id = :id and version = :version
       and not (state = 'closing to be confirmed' and closed_by = :personId)`,
    {
      id: move.alert.id,
      version: move.alert.version,
      state: move.state,
      changeNumber,
      takenBy: move.takenBy ?? null,
      putOffUntil: move.putOffUntil ?? null,
      reason: move.closing?.reason ?? null,
      closingText: move.closing?.text ?? null,
      personId: move.personId,
      ends: ends ? 1 : 0,
      now: move.now,
    },
  );
  if (affectedRows !== 1) return false;
  await execute(
    tx,
    'insert into alert_events (alert_id, at, person_id, what, text) values (:id, :now, :personId, :what, :text)',
    {
      id: move.alert.id,
      now: move.now,
      personId: move.personId,
      what: move.what,
      text: move.text,
    },
  );
  return true;
}

/** The next number in the order of the desk's changes; islands ask for what came after the one they have. */
export async function nextChange(tx: Transaction, deskId: number): Promise<number> {
  await execute(
    tx,
    'insert into desk_changes (desk_id, change_number) values (:deskId, 1) on duplicate key update change_number = change_number + 1',
    { deskId },
  );
  const row = await selectOne<{ changeNumber: number }>(
    tx,
    'select change_number as changeNumber from desk_changes where desk_id = :deskId',
    {
      deskId,
    },
  );
  if (!row) throw new Error(`desk ${deskId} has no change number`);
  return row.changeNumber;
}
