/** The outbox against SMTP servers that behave, fail, hang and die; each test has an outbox of its own. */
import '../support/useDatabase.ts';
import { once } from 'node:events';
import { createServer, type AddressInfo } from 'node:net';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { claimMail, queueMail } from '../../src/server/db/repositories/outbox.ts';
import { execute, select } from '../../src/server/db/sql.ts';
import { env } from '../../src/server/config/env.ts';
import { mailTransport, type MailTransport } from '../../src/server/mail/transport.ts';
import { sendDueMail, waitMs } from '../../src/server/services/sendMail.ts';
import { freePort } from '../../jobs/database.mjs';
import { useOwnDatabase } from '../support/ownDatabase.ts';

interface Received {
  readonly to: readonly string[];
  readonly messageId: string;
  readonly headerNames: readonly string[];
  readonly subject: string;
}

class Sink {
  readonly received: Received[] = [];
  /** What the server answers at RCPT and after DATA; null: yes. */
  recipientAnswer: number | null = null;
  dataAnswer: number | null = null;
  private readonly server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    onRcptTo: (_address, _session, done) => done(this.fault(this.recipientAnswer)),
    onData: (stream, session, done) => {
      void simpleParser(stream).then((mail) => {
        if (this.dataAnswer !== null) return done(this.fault(this.dataAnswer));
        this.received.push({
          to: session.envelope.rcptTo.map(({ address }) => address),
          messageId: mail.messageId ?? '',
          headerNames: mail.headerLines.map(({ key }) => key),
          subject: mail.subject ?? '',
        });
        done();
      });
    },
  });

  private fault(code: number | null): Error | null {
    return code === null ? null : Object.assign(new Error('said no'), { responseCode: code });
  }

  async listen(port = 0): Promise<number> {
    const inner = this.server.server;
    this.server.listen(port, '127.0.0.1');
    await once(inner, 'listening');
    return (inner.address() as AddressInfo).port;
  }

  close(): Promise<void> {
    return new Promise((done) => this.server.close(() => done()));
  }
}

const NOW = new Date('2026-12-01T06:00:00.000Z');
const after = (ms: number): Date => new Date(NOW.getTime() + ms);
const transportTo = (port: number): MailTransport =>
  mailTransport({ ...env(), SMTP_URL: undefined, MAIL_SINK_PORT: port });

const queue = (messageKey: string, change: Partial<Parameters<typeof queueMail>[1]> = {}): Promise<boolean> =>
  inTransaction((tx) =>
    queueMail(tx, {
      messageKey,
      personId: null,
      toName: 'Ada Lamprey',
      toAddress: 'ada.lamprey@lender.example',
      subject: 'Morning list',
      text: 'text',
      html: '<p>html</p>',
      headers: {},
      now: NOW,
      ...change,
    }),
  );

const states = (): Promise<{ state: string; tries: number }[]> =>
  inTransaction((tx) => select(tx, 'select state, tries from outbox order by id'));
const audited = async (): Promise<string[]> =>
  (
    await inTransaction((tx) =>
      select<{ action: string }>(
        tx,
        `select action from audit_entries where subject_kind = 'mail' order by seq`,
      ),
    )
  ).map(({ action }) => action);

beforeAll(async () => {
  await useOwnDatabase();
});
beforeEach(() => inTransaction((tx) => execute(tx, 'delete from outbox')));
afterAll(closeDatabase);

describe('mail in the outbox', () => {
  test('is sent once, to the one address, under an id made from its key, however often it is queued or sending is asked for', async () => {
    const sink = new Sink();
    const transport = transportTo(await sink.listen());
    expect(await queue('digest:1')).toBe(true);
    expect(await queue('digest:1')).toBe(false);
    expect(await sendDueMail(NOW, transport)).toEqual({ sent: 1, putBack: 0, failed: 0 });
    expect(await sendDueMail(NOW, transport)).toEqual({ sent: 0, putBack: 0, failed: 0 });
    expect(sink.received.map(({ to }) => to)).toEqual([['ada.lamprey@lender.example']]);
    expect(sink.received[0]?.messageId).toMatch(/^<[0-9a-f]{40}@lender\.example>$/);
    expect(await states()).toEqual([{ state: 'sent', tries: 1 }]);
    expect(await audited()).toContain('send-mail');
    await sink.close();
  });

  test('is sent once by three senders at once', async () => {
    const sink = new Sink();
    const port = await sink.listen();
    for (let number = 0; number < 12; number += 1) await queue(`digest:${number}`);
    const senders = [transportTo(port), transportTo(port), transportTo(port)];
    await Promise.all(senders.map((transport) => sendDueMail(NOW, transport)));
    expect(sink.received).toHaveLength(12);
    expect(new Set(sink.received.map(({ messageId }) => messageId)).size).toBe(12);
    await sink.close();
  });

  test('waits while the server is gone, tries only one of many, and is delivered once when the server is back', async () => {
    const port = await freePort();
    const transport = transportTo(port);
    await queue('one');
    await queue('two');
    expect(await sendDueMail(NOW, transport)).toEqual({ sent: 0, putBack: 1, failed: 0 });
    expect(await states()).toEqual([
      { state: 'queued', tries: 1 },
      { state: 'queued', tries: 0 },
    ]);
    const sink = new Sink();
    await sink.listen(port);
    expect((await sendDueMail(after(waitMs(1) - 1), transport)).sent).toBe(1);
    expect((await sendDueMail(after(waitMs(1)), transport)).sent).toBe(1);
    expect((await sendDueMail(after(10 * waitMs(1)), transport)).sent).toBe(0);
    expect(sink.received).toHaveLength(2);
    await sink.close();
  });

  test.each([451, 421])('that the server refuses for now (%i) is sent later', async (code) => {
    const sink = new Sink();
    const transport = transportTo(await sink.listen());
    sink.dataAnswer = code;
    await queue('later');
    expect(await sendDueMail(NOW, transport)).toEqual({ sent: 0, putBack: 1, failed: 0 });
    sink.dataAnswer = null;
    expect(await sendDueMail(after(waitMs(1)), transport)).toEqual({ sent: 1, putBack: 0, failed: 0 });
    expect(sink.received).toHaveLength(1);
    await sink.close();
  });

  test('that the server refuses for good (550) is failed, not tried again, audited, and stops nobody else', async () => {
    const sink = new Sink();
    const transport = transportTo(await sink.listen());
    sink.recipientAnswer = 550;
    await queue('never');
    expect(await sendDueMail(NOW, transport)).toEqual({ sent: 0, putBack: 0, failed: 1 });
    sink.recipientAnswer = null;
    await queue('other');
    expect((await sendDueMail(after(24 * 3_600_000), transport)).sent).toBe(1);
    expect((await states()).map(({ state }) => state)).toEqual(['failed', 'sent']);
    expect(await audited()).toContain('mail-failed');
    await sink.close();
  });

  test('is given up after four days', async () => {
    const transport = transportTo(await freePort());
    await queue('old');
    const fourDays = 4 * 24 * 3_600_000;
    expect(await sendDueMail(after(fourDays), transport)).toMatchObject({ putBack: 1 });
    expect(await sendDueMail(after(fourDays + 2 * 3_600_000), transport)).toMatchObject({ failed: 1 });
  });

  test('whose sender died while sending is sent once more under the same id, and the audit log says so', async () => {
    const sink = new Sink();
    const transport = transportTo(await sink.listen());
    await queue('window');
    const claimed = await inTransaction((tx) => claimMail(tx, NOW, 120));
    await transport.send(claimed!);
    // The sender is killed here: the server said yes, and nobody recorded it.
    expect((await sendDueMail(NOW, transport)).sent).toBe(0);
    await inTransaction((tx) => execute(tx, 'update outbox set lease_until = now(6) - interval 1 second'));
    expect((await sendDueMail(NOW, transport)).sent).toBe(1);
    expect(sink.received).toHaveLength(2);
    expect(new Set(sink.received.map(({ messageId }) => messageId)).size).toBe(1);
    expect(await audited()).toContain('mail-outcome-unknown');
    await sink.close();
  });

  test('whose sender died twice is not sent a third time', async () => {
    const sink = new Sink();
    const transport = transportTo(await sink.listen());
    await queue('window twice');
    const dying: MailTransport = { send: () => Promise.reject(new Error('killed')) };
    for (let death = 1; death <= 2; death += 1) {
      await expect(sendDueMail(NOW, dying)).rejects.toThrow('killed');
      await inTransaction((tx) => execute(tx, 'update outbox set lease_until = now(6) - interval 1 second'));
    }
    expect(await sendDueMail(NOW, transport)).toEqual({ sent: 0, putBack: 0, failed: 0 });
    expect(await states()).toEqual([{ state: 'failed', tries: 2 }]);
    expect(sink.received).toHaveLength(0);
    await sink.close();
  });

  test('waits where the server takes the connection and says nothing', async () => {
    const silent = createServer(() => undefined);
    await once(silent.listen(0, '127.0.0.1'), 'listening');
    const transport = transportTo((silent.address() as AddressInfo).port);
    await queue('silence');
    const began = performance.now();
    expect(await sendDueMail(NOW, transport)).toMatchObject({ putBack: 1 });
    expect(performance.now() - began).toBeLessThan(15_000);
    silent.close();
  });

  test.each([
    'ada@lender.example\r\nBcc: evil@elsewhere.example',
    'ada@lender.example, evil@elsewhere.example',
    'desk: evil@elsewhere.example;',
    '"ada@lender.example evil@elsewhere.example"@lender.example',
    'Ada <evil@elsewhere.example>',
  ])('goes to nobody where the address is %j', async (toAddress) => {
    const sink = new Sink();
    const transport = transportTo(await sink.listen());
    await queue('hostile', { toAddress });
    expect(await sendDueMail(NOW, transport)).toMatchObject({ failed: 1, sent: 0 });
    expect(sink.received).toEqual([]);
    await sink.close();
  });

  test('gets no new header and no second reader from a name or subject', async () => {
    const sink = new Sink();
    const transport = transportTo(await sink.listen());
    await queue('plain');
    for (const [number, text] of [
      'x\r\nBcc: evil@elsewhere.example',
      'x\nX-Evil: 1',
      '"a" <evil@elsewhere.example>, b',
      'group: evil@elsewhere.example;',
      `${'long '.repeat(39)}`,
      'Ünïcödé',
    ].entries())
      await queue(`hostile:${number}`, { toName: text, subject: text });
    expect(await sendDueMail(NOW, transport)).toMatchObject({ sent: 7 });
    for (const mail of sink.received) {
      expect(mail.to).toEqual(['ada.lamprey@lender.example']);
      expect(mail.headerNames).toEqual(sink.received[0]?.headerNames);
    }
    await sink.close();
  });
});

test('waiting doubles from half a minute to an hour', () => {
  expect([1, 2, 3, 7, 8, 40].map((tries) => waitMs(tries) / 1_000)).toEqual([
    30, 60, 120, 1_920, 3_600, 3_600,
  ]);
});
