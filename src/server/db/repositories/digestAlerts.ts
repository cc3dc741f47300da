/** What the digest tells: open alerts, and those that the product changed since the last digest. */
import type { Transaction } from 'sequelize';
import type { AlertKind, AlertState, Severity } from '../../../core/alerts/alert.ts';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { decimal, type Decimal } from '../../../core/money/decimal.ts';
import { groupRows } from '../groupRows.ts';
import { select, selectOne } from '../sql.ts';
import type { AlertEventWord } from './alerts.ts';

export interface DigestAlert {
  readonly id: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskId: number;
  readonly deskName: string;
  readonly deskHeadId: number | null;
  readonly ownerId: number;
  readonly kind: AlertKind;
  readonly severity: Severity;
  readonly state: AlertState;
  readonly isOpen: boolean;
  readonly conditionGone: boolean;
  readonly sentence: string;
  readonly factDate: PlainDate;
  readonly dueOn: PlainDate;
  /** What the product did to it in the window. */
  readonly events: readonly AlertEventWord[];
}

/** Open alerts and those with an event of the product's own after `since` (null: ever) up to `until`. */
export async function listDigestAlerts(
  tx: Transaction,
  window: { readonly since: Date | null; readonly until: Date },
): Promise<DigestAlert[]> {
  const values = { since: window.since ?? new Date(0), until: window.until };
  const rows = await select<
    Omit<DigestAlert, 'events' | 'isOpen' | 'conditionGone'> & { isOpen: number; conditionGone: number }
  >(
    tx,
    `select a.id, a.borrower_id as borrowerId, b.name as borrowerName, b.desk_id as deskId, d.name as deskName,
       d.head_id as deskHeadId, a.owner_id as ownerId, a.kind, a.severity, a.state,
       a.open_slot is not null as isOpen, a.condition_gone_at is not null as conditionGone, a.sentence,
       a.fact_date as factDate, a.due_on as dueOn
     from alerts a join borrowers b on b.id = a.borrower_id join desks d on d.id = b.desk_id
     where a.open_slot is not null or a.id in (
       select e.alert_id from alert_events e where e.person_id is null and e.at > :since and e.at <= :until)
     order by field(a.severity, 'urgent', 'soon', 'note'), a.due_on, b.name, a.id`,
    values,
  );
  const events = groupRows(
    await select<{ alertId: number; what: AlertEventWord }>(
      tx,
      `select alert_id as alertId, what from alert_events
       where person_id is null and at > :since and at <= :until order by id`,
      values,
    ),
    (row) => row.alertId,
    (row) => row.what,
  );
  return rows.map((row) => ({
    ...row,
    isOpen: row.isOpen === 1,
    conditionGone: row.conditionGone === 1,
    events: events.get(row.id) ?? [],
  }));
}

/** The limits of a borrower's facilities by currency, in whole units. */
export async function listExposures(
  tx: Transaction,
  borrowerIds: readonly number[],
): Promise<ReadonlyMap<number, { readonly currency: string; readonly limit: Decimal }[]>> {
  const rows = await select<{ borrowerId: number; currency: string; total: string }>(
    tx,
    `select borrower_id as borrowerId, currency, sum(limit_amount) as total
     from facilities where borrower_id in (:borrowerIds) group by borrower_id, currency order by borrower_id, currency`,
    { borrowerIds },
  );
  return groupRows(
    rows,
    (row) => row.borrowerId,
    (row) => ({ currency: row.currency, limit: decimal(row.total) }),
  );
}

export interface DigestReader {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  readonly wantsDigest: boolean;
  readonly isAdministrator: boolean;
}

/** Active people. */
export async function listDigestReaders(tx: Transaction): Promise<DigestReader[]> {
  const rows = await select<{
    id: number;
    name: string;
    email: string;
    wantsDigest: number;
    isAdministrator: number;
  }>(
    tx,
    `select p.id, p.name, p.email, p.wants_digest as wantsDigest,
       exists (select r.role from person_roles r where r.person_id = p.id and r.role = 'administrator') as isAdministrator
     from people p where p.is_active = 1 order by p.id`,
  );
  return rows.map((row) => ({
    ...row,
    wantsDigest: row.wantsDigest === 1,
    isAdministrator: row.isAdministrator === 1,
  }));
}

/** Whose alerts each deputy works on that day. */
export async function listDeputised(tx: Transaction, on: PlainDate): Promise<ReadonlyMap<number, number[]>> {
  const rows = await select<{ deputyId: number; personId: number }>(
    tx,
    `select deputy_id as deputyId, person_id as personId from deputies
     where from_date <= :on and until_date >= :on order by deputy_id, person_id`,
    { on },
  );
  return groupRows(
    rows,
    (row) => row.deputyId,
    (row) => row.personId,
  );
}

/** Mails that wait to be sent, whatever they tell. */
export async function countWaitingMail(tx: Transaction): Promise<number> {
  const row = await selectOne<{ waiting: number }>(
    tx,
    `select count(*) as waiting from outbox where state in ('queued', 'sending')`,
  );
  return row?.waiting ?? 0;
}
