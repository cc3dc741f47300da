/** Mail that waits to leave. A row in the transaction of what it tells; another process sends it after. */
import type { Transaction } from 'sequelize';
import { execute } from '../sql.ts';

export interface QueuedMail {
  /** Names the mail for ever: the second row with the same key is not written. */
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
  const { affectedRows } = await execute(
    tx,
    `insert ignore into outbox (message_key, person_id, to_name, to_address, subject, text_body, html_body, headers,
       state, next_try_at, queued_at)
     values (:messageKey, :personId, :toName, :toAddress, :subject, :text, :html, :headers, 'queued', :now, :now)`,
    {
      messageKey: mail.messageKey,
      personId: mail.personId,
      toName: mail.toName,
      toAddress: mail.toAddress,
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
      headers: JSON.stringify(mail.headers),
      now: mail.now,
    },
  );
  return affectedRows === 1;
}
