/** A borrower's alerts as the assessment writes them; what people do with them is in alertStates.ts. */
import type { Transaction } from 'sequelize';
import { alertSlot, type KnownAlert } from '../../../core/alerts/alertChanges.ts';
import type { AlertFinding, AlertState } from '../../../core/alerts/alert.ts';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { execute, select } from '../sql.ts';

/** What an event of the product's own says; the digest looks for these words. */
export const ALERT_EVENTS = {
  raised: 'Raised',
  worsened: 'Worsened',
  improved: 'Improved',
  back: 'Condition is back',
  'new facts': 'New facts',
  closed: 'Condition gone',
  gone: 'Condition gone, confirm',
  'put off ended': 'Put off ended',
} as const;
export type AlertEventWord = (typeof ALERT_EVENTS)[keyof typeof ALERT_EVENTS];

export interface BorrowerAlert extends KnownAlert {
  readonly dueOn: PlainDate;
  readonly isTaken: boolean;
  readonly putOffUntil: PlainDate | null;
}

interface AlertRow extends Omit<BorrowerAlert, 'evidence' | 'isOpen' | 'conditionGone' | 'isTaken'> {
  readonly evidence: string;
  readonly isOpen: number;
  readonly conditionGone: number;
  readonly isTaken: number;
}

/** Every alert of the borrower, oldest first, locked so that a person's step and the night take turns. */
export async function listAlertsForUpdate(tx: Transaction, borrowerId: number): Promise<BorrowerAlert[]> {
  const rows = await select<AlertRow>(
    tx,
    `select id, kind, covenant_id as covenantId, severity, state, open_slot is not null as isOpen, fact_date as factDate,
       sentence, would_change as wouldChange, evidence, condition_gone_at is not null as conditionGone,
       input_version as inputVersion,
       closed_at as closedAt, due_on as dueOn, taken_by is not null as isTaken, put_off_until as putOffUntil
     from alerts where borrower_id = :borrowerId order by id for update`,
    { borrowerId },
  );
  return rows.map((row) => ({
    ...row,
    evidence: JSON.parse(row.evidence) as AlertFinding['evidence'],
    isOpen: row.isOpen === 1,
    conditionGone: row.conditionGone === 1,
    isTaken: row.isTaken === 1,
  }));
}

export interface NewAlert {
  readonly borrowerId: number;
  readonly deskId: number;
  readonly ownerId: number;
  readonly finding: AlertFinding;
  readonly dueOn: PlainDate;
  readonly runId: number | null;
  readonly inputVersion: number;
  readonly changeNumber: number;
  readonly now: Date;
}

/** The unique slot refuses a second open alert: the caller sees a duplicate-key error. */
export async function insertAlert(tx: Transaction, alert: NewAlert): Promise<number> {
  const { finding, ...place } = alert;
  const { insertId } = await execute(
    tx,
    `insert into alerts (borrower_id, desk_id, covenant_id, kind, severity, state, open_slot, fact_date, sentence,
       would_change, evidence, owner_id, due_on, raised_at, raised_run_id, last_seen_at, input_version, changed_at,
       changed_how, change_number)
     values (:borrowerId, :deskId, :covenantId, :kind, :severity, 'raised', :slot, :factDate, :sentence,
       :wouldChange, :evidence, :ownerId, :dueOn, :now, :runId, :now, :inputVersion, :now,
       'raised', :changeNumber)`,
    {
      ...place,
      ...columnsOf(finding),
      kind: finding.kind,
      covenantId: finding.covenantId,
      slot: alertSlot(alert.borrowerId, finding),
    },
  );
  return insertId;
}

const columnsOf = (finding: AlertFinding) => ({
  severity: finding.severity,
  factDate: finding.factDate,
  sentence: finding.sentence,
  wouldChange: finding.wouldChange,
  evidence: JSON.stringify(finding.evidence),
});

export interface AlertUpdateFacts {
  readonly id: number;
  readonly finding: AlertFinding;
  readonly how: string;
  readonly state: AlertState;
  readonly putOffUntil: PlainDate | null;
  readonly dueOn: PlainDate;
  readonly inputVersion: number;
  readonly changeNumber: number;
  readonly now: Date;
}

/** New facts on an open alert: the counter rises, and a condition that was gone is not any more. */
export async function updateAlertFacts(
  tx: Transaction,
  { finding, ...update }: AlertUpdateFacts,
): Promise<void> {
  await execute(
    tx,
    `update alerts set severity = :severity, fact_date = :factDate, sentence = :sentence, would_change = :wouldChange,
       evidence = :evidence, state = :state, put_off_until = :putOffUntil, due_on = :dueOn, counter = counter + 1,
       condition_gone_at = null, last_seen_at = :now,
       input_version = :inputVersion, changed_at = :now, changed_how = :how,
       change_number = :changeNumber, version = version + 1
     where id = :id`,
    { ...update, ...columnsOf(finding) },
  );
}

/** The same facts, worded for the day: no counter, no version, no change of the desk. */
export async function markSeen(
  tx: Transaction,
  seen: {
    readonly id: number;
    readonly finding: AlertFinding;
    readonly inputVersion: number;
    readonly now: Date;
  },
): Promise<void> {
  const { sentence, wouldChange, evidence } = columnsOf(seen.finding);
  await execute(
    tx,
    `update alerts set last_seen_at = :now, sentence = :sentence, would_change = :wouldChange, evidence = :evidence,
       input_version = :inputVersion
     where id = :id`,
    { id: seen.id, now: seen.now, inputVersion: seen.inputVersion, sentence, wouldChange, evidence },
  );
}

interface OneChange {
  readonly id: number;
  readonly changeNumber: number;
  readonly now: Date;
}

export async function closeByItself(tx: Transaction, change: OneChange): Promise<void> {
  await execute(
    tx,
    `update alerts set state = 'closed', open_slot = null, closed_at = :now, closing_text = 'Condition gone',
       condition_gone_at = :now, put_off_until = null, changed_at = :now, changed_how = 'closed',
       change_number = :changeNumber, version = version + 1
     where id = :id`,
    { ...change },
  );
}

export async function markConditionGone(tx: Transaction, change: OneChange): Promise<void> {
  await execute(
    tx,
    `update alerts set condition_gone_at = :now, changed_at = :now, changed_how = 'condition gone',
       change_number = :changeNumber, version = version + 1
     where id = :id`,
    { ...change },
  );
}

/** The day it was put off until has come: it is its owner's again. */
export async function endPuttingOff(
  tx: Transaction,
  change: OneChange & { readonly state: AlertState },
): Promise<void> {
  await execute(
    tx,
    `update alerts set state = :state, put_off_until = null, changed_at = :now, changed_how = 'back',
       change_number = :changeNumber, version = version + 1
     where id = :id`,
    { ...change },
  );
}

export async function insertAlertEvent(
  tx: Transaction,
  event: {
    readonly alertId: number;
    readonly at: Date;
    readonly what: AlertEventWord;
    readonly text: string;
  },
): Promise<void> {
  await execute(
    tx,
    'insert into alert_events (alert_id, at, person_id, what, text) values (:alertId, :at, null, :what, :text)',
    event,
  );
}
