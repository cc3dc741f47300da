/**
 * Sends what waits in the outbox. Mail is handed to the server at least once: the one window in which it can
 * leave twice is between the server's yes and the row that records it, and that window is audited.
 */
import type { Transaction } from 'sequelize';
import { inTransaction } from '../db/inTransaction.ts';
import {
  claimLostMail,
  claimMail,
  markFailed,
  markSent,
  putBack,
  type ClaimedMail,
} from '../db/repositories/outbox.ts';
import { mailTransport, type MailTransport, type SendOutcome } from '../mail/transport.ts';
import { systemActor } from './actor.ts';
import { audit } from './write.ts';

/** Longer than all timeouts of one try together. */
const LEASE_SECONDS = 120;
const FIRST_WAIT_MS = 30_000;
const LONGEST_WAIT_MS = 60 * 60_000;
/** RFC 5321 4.5.4.1: give up after four to five days. */
const GIVE_UP_MS = 4 * 24 * 60 * 60_000;
const MOST_PER_CALL = 50;

export interface MailSummary {
  readonly sent: number;
  readonly putBack: number;
  readonly failed: number;
}

/** Sends what is due, at most fifty; stops at the first try that reaches no server. */
export async function sendDueMail(
  now: Date,
  transport: MailTransport = sharedTransport(),
): Promise<MailSummary> {
  await takeUpLostMail(now);
  const summary = { sent: 0, putBack: 0, failed: 0 };
  for (let count = 0; count < MOST_PER_CALL; count += 1) {
    const mail = await inTransaction((tx) => claimMail(tx, now, LEASE_SECONDS));
    if (!mail) break;
    const outcome = await transport.send(mail);
    const settled = await inTransaction((tx) => settle(tx, mail, outcome, now));
    summary[settled] += 1;
    if (outcome.kind === 'later' && outcome.isServerGone) break;
  }
  return summary;
}

let shared: MailTransport | null = null;
const sharedTransport = (): MailTransport => (shared ??= mailTransport());

/** Waits double from half a minute to an hour. */
export const waitMs = (tries: number): number =>
  Math.min(LONGEST_WAIT_MS, FIRST_WAIT_MS * 2 ** Math.max(0, tries - 1));

async function settle(
  tx: Transaction,
  mail: ClaimedMail,
  outcome: SendOutcome,
  now: Date,
): Promise<keyof MailSummary> {
  if (outcome.kind === 'sent') {
    await markSent(tx, mail, now);
    await record(tx, mail, now, 'send-mail', `Mail "${mail.subject}" was handed to the mail server`);
    return 'sent';
  }
  const isTooOld = now.getTime() - mail.queuedAt.getTime() > GIVE_UP_MS;
  if (outcome.kind === 'later' && !isTooOld) {
    await putBack(tx, mail, outcome.reason, new Date(now.getTime() + waitMs(mail.tries)));
    return 'putBack';
  }
  await markFailed(tx, mail, outcome.reason);
  await record(tx, mail, now, 'mail-failed', `Mail "${mail.subject}" could not be sent: ${outcome.reason}`);
  return 'failed';
}

/** Mail whose sender died: once it is sent again, a second time it is given up. Both are said in the audit log. */
async function takeUpLostMail(now: Date): Promise<void> {
  for (let isMore = true; isMore;) {
    isMore = await inTransaction(async (tx) => {
      const mail = await claimLostMail(tx, LEASE_SECONDS);
      if (!mail) return false;
      const isFirst = mail.unknownOutcomes === 0;
      if (isFirst) await putBack(tx, mail, 'unknown outcome, sent once more', now);
      else await markFailed(tx, mail, 'unknown outcome twice');
      await record(
        tx,
        mail,
        now,
        'mail-outcome-unknown',
        isFirst
          ? 'Unknown outcome: the sender ended while it sent this mail. It is sent once more and may arrive twice'
          : 'Unknown outcome twice: this mail is not sent again and may not have arrived',
      );
      return true;
    });
  }
}

const record = (
  tx: Transaction,
  mail: Pick<ClaimedMail, 'id' | 'messageKey' | 'toAddress'>,
  now: Date,
  action: string,
  summary: string,
): Promise<number> =>
  audit(tx, systemActor('outbox', now), {
    action,
    subjectKind: 'mail',
    subjectId: String(mail.id),
    borrowerId: null,
    deskId: null,
    summary: summary.slice(0, 500),
    before: null,
    after: { messageKey: mail.messageKey, toAddress: mail.toAddress },
  });
