/**
 * Mail that is to be sent: queued in the transaction of what it tells of, sent after it by the worker.
 *
 * queued → sending (with a lease by the database's clock) → sent or failed. A row whose lease ended while it was
 * sending is one whose sender died: whether the mail left is unknown.
 */
import type { Transaction } from 'sequelize';
import { isDuplicate } from '../inTransaction.ts';
import { execute, selectOne } from '../sql.ts';

export interface QueuedMail {
  /** Names the mail for ever: a second one with the same key is not queued. */
  readonly messageKey: string;
  readonly personId: number | null;
  readonly toName: string;
  readonly toAddress: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly headers: Readonly<Record<string, string>>;
  readonly now: Date;
}

/** False where a mail with this key is there already. */
export async function queueMail(tx: Transaction, mail: QueuedMail): Promise<boolean> {
  try {
    await execute(
      tx,
      `insert into outbox (message_key, person_id, to_name, to_address, subject, text_body, html_body, headers,
         state, next_try_at, queued_at)
       values (:messageKey, :personId, :toName, :toAddress, :subject, :text, :html, :headers, 'queued', :now, :now)`,
      { ...mail, headers: JSON.stringify(mail.headers) },
    );
    return true;
  } catch (error) {
    if (isDuplicate(error)) return false;
    throw error;
  }
}

export interface ClaimedMail extends Omit<QueuedMail, 'now'> {
  readonly id: number;
  readonly fence: number;
  readonly tries: number;
  readonly queuedAt: Date;
}

interface OutboxRow extends Omit<ClaimedMail, 'headers'> {
  readonly headers: string;
}

/** Takes the oldest mail that is due for this sender alone, or none. */
export async function claimMail(
  tx: Transaction,
  now: Date,
  leaseSeconds: number,
): Promise<ClaimedMail | null> {
  const row = await selectOne<OutboxRow>(
    tx,
    `select id, message_key as messageKey, person_id as personId, to_name as toName, to_address as toAddress, subject,
       text_body as text, html_body as html, headers, fence, tries, queued_at as queuedAt
     from outbox where state = 'queued' and next_try_at <= :now order by next_try_at, id limit 1
     for update skip locked`,
    { now },
  );
  if (!row) return null;
  await execute(
    tx,
    `update outbox set state = 'sending', fence = fence + 1, tries = tries + 1,
       lease_until = now(6) + interval :leaseSeconds second where id = :id`,
    { id: row.id, leaseSeconds },
  );
  return {
    ...row,
    headers: JSON.parse(row.headers) as Record<string, string>,
    fence: row.fence + 1,
    tries: row.tries + 1,
  };
}

type Claim = Pick<ClaimedMail, 'id' | 'fence'>;

/** These change nothing where the lease had ended and somebody else took the mail over. */
export const markSent = (tx: Transaction, claim: Claim, now: Date): Promise<void> =>
  settle(tx, claim, `state = 'sent', sent_at = :now, lease_until = null, failure = null`, { now });

export const markFailed = (tx: Transaction, claim: Claim, failure: string): Promise<void> =>
  settle(tx, claim, `state = 'failed', lease_until = null, failure = :failure`, { failure });

export const putBack = (tx: Transaction, claim: Claim, failure: string, nextTryAt: Date): Promise<void> =>
  settle(tx, claim, `state = 'queued', lease_until = null, failure = :failure, next_try_at = :nextTryAt`, {
    failure,
    nextTryAt,
  });

async function settle(
  tx: Transaction,
  claim: Claim,
  change: string,
  values: Record<string, string | Date>,
): Promise<void> {
  await execute(tx, `update outbox set ${change} where id = :id and fence = :fence and state = 'sending'`, {
    ...values,
    id: claim.id,
    fence: claim.fence,
  });
}

export interface LostMail extends Claim {
  readonly messageKey: string;
  readonly toAddress: string;
  /** How often before this the outcome was unknown. */
  readonly unknownOutcomes: number;
}

/** Takes a mail whose sender died while sending. */
export async function claimLostMail(tx: Transaction, leaseSeconds: number): Promise<LostMail | null> {
  const row = await selectOne<LostMail>(
    tx,
    `select id, fence, message_key as messageKey, to_address as toAddress, unknown_outcomes as unknownOutcomes
     from outbox where state = 'sending' and lease_until < now(6) order by id limit 1 for update skip locked`,
  );
  if (!row) return null;
  await execute(
    tx,
    `update outbox set fence = fence + 1, unknown_outcomes = unknown_outcomes + 1,
       lease_until = now(6) + interval :leaseSeconds second where id = :id`,
    { id: row.id, leaseSeconds },
  );
  return { ...row, fence: row.fence + 1 };
}

/** How much waits to leave, and since when. */
export async function outboxBacklog(
  tx: Transaction,
): Promise<{ readonly waiting: number; readonly oldestQueuedAt: Date | null }> {
  const row = await selectOne<{ waiting: number; oldestQueuedAt: Date | null }>(
    tx,
    `select count(*) as waiting, min(queued_at) as oldestQueuedAt from outbox where state in ('queued', 'sending')`,
  );
  return row ?? { waiting: 0, oldestQueuedAt: null };
}
