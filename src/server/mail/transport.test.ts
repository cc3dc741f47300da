import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';
import { expect, test } from 'vitest';
import { mailTransport } from './transport.ts';

const MESSAGE = {
  messageKey: 'k',
  toName: 'Ada North',
  toAddress: 'ada@lender.example',
  subject: 'A link',
  text: 'text',
  html: '<p>text</p>',
  headers: {},
};

/** 0.0.0.0 reaches this machine and is none of the names by which a mail server on it is called. */
test.each([
  ['127.0.0.1', 'sent'],
  ['0.0.0.0', 'later'],
])('mail to a server at %s that offers no encryption is %s', async (host, kind) => {
  let received = 0;
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    disableReverseLookup: true,
    onData: (stream, _session, done) => {
      received += 1;
      stream.resume().on('end', () => done());
    },
  });
  server.listen(0, '127.0.0.1');
  await once(server.server, 'listening');
  const { port } = server.server.address() as AddressInfo;
  const transport = mailTransport({
    SMTP_URL: `smtp://${host}:${port}`,
    MAIL_SINK_PORT: 1,
    MAIL_FROM: 'underkeel@lender.example',
  });
  expect((await transport.send(MESSAGE)).kind).toBe(kind);
  expect(received).toBe(kind === 'sent' ? 1 : 0);
  await new Promise<void>((done) => server.close(done));
});
