/**
 * The local mail sink: takes every mail of the product on loopback and shows it on a page of its own, one port
 * higher. It is a process beside the product, started only where no SMTP server is configured, because whoever
 * opens its page reads everybody's mail.
 */
import { once } from 'node:events';
import { mkdir, readFile, readdir, rm, writeFile } from 'node:fs/promises';
import { createServer, type Server } from 'node:http';
import { join } from 'node:path';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { env } from '../src/server/config/env.ts';
import { answerSinkPage, type SunkMail } from './mailSinkPages.ts';
import { runUntilTold } from './supervised.ts';

const BYTES_MOST = 25 * 1024 * 1024;
const KEPT_MOST = 1_000;

const { MAIL_SINK_PORT, DATA_DIR, SMTP_URL } = env();
if (SMTP_URL)
  throw new Error('an SMTP server is configured (SMTP_URL): the mail sink does not start beside it');
const folder = join(DATA_DIR, 'mail');
await mkdir(folder, { recursive: true, mode: 0o700 });
const mails: SunkMail[] = [];
for (const name of (await readdir(folder)).filter((file) => file.endsWith('.json')).sort())
  mails.push(JSON.parse(await readFile(join(folder, name), 'utf8')) as SunkMail);
let lastId = mails.at(-1)?.id ?? 0;

async function keep(raw: Buffer, envelope: { from: string; to: string[] }): Promise<void> {
  const parsed = await simpleParser(raw);
  const mail: SunkMail = {
    id: (lastId += 1),
    receivedAt: new Date().toISOString(),
    envelope,
    messageId: parsed.messageId ?? '',
    subject: parsed.subject ?? '',
    to: [parsed.to ?? []].flat().flatMap(({ value }) => value.map(({ address }) => address ?? '')),
    headers: Object.fromEntries(parsed.headerLines.map(({ key, line }) => [key, line])),
    text: parsed.text ?? '',
    html: parsed.html || '',
  };
  await writeFile(fileOf(mail.id), JSON.stringify(mail), { mode: 0o600 });
  mails.push(mail);
  for (const old of mails.splice(0, Math.max(0, mails.length - KEPT_MOST))) await rm(fileOf(old.id));
}

const fileOf = (id: number): string => join(folder, `${String(id).padStart(8, '0')}.json`);

const smtp = new SMTPServer({
  authOptional: true,
  disabledCommands: ['AUTH', 'STARTTLS'],
  disableReverseLookup: true,
  size: BYTES_MOST,
  logger: false,
  onData: (stream, session, done) => {
    const pieces: Buffer[] = [];
    stream.on('data', (piece: Buffer) => pieces.push(piece));
    stream.on('end', () => {
      const from = session.envelope.mailFrom === false ? '' : session.envelope.mailFrom.address;
      keep(Buffer.concat(pieces), { from, to: session.envelope.rcptTo.map(({ address }) => address) }).then(
        () => done(),
        (error: unknown) => done(error instanceof Error ? error : new Error(String(error))),
      );
    });
  },
});
// A client that goes away in the middle of a mail is no fault of the sink.
smtp.on('error', (error: Error) => console.error(`mail sink: ${error.message}`));

const pages = createServer((request, response) => answerSinkPage(mails, request, response));

async function listen(server: SMTPServer | Server, port: number): Promise<void> {
  const inner = server instanceof SMTPServer ? server.server : server;
  const listening = once(inner, 'listening');
  server.listen(port, '127.0.0.1');
  await listening;
}

runUntilTold('mail sink', async () => {
  pages.close();
  pages.closeAllConnections();
  await new Promise<void>((done) => smtp.close(done));
});
await listen(smtp, MAIL_SINK_PORT);
await listen(pages, MAIL_SINK_PORT + 1);
