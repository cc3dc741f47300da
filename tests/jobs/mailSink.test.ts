/** The mail sink shows everybody's mail: only to this machine, and never beside a mail server. */
import { request } from 'node:http';
import { connect } from 'node:net';
import { expect, inject, test } from 'vitest';
import { startProgram } from '../support/program.ts';

const sink = () => new URL(inject('sinkUrl'));

test('is not started where an SMTP server is configured', async () => {
  const program = startProgram('jobs/mailSink.ts', {
    ...inject('productSettings'),
    MAIL_SINK_PORT: '1',
    SMTP_URL: 'smtps://smtp.lender.example:465',
  });
  expect(await program.ended).toBe(1);
  expect(program.output()).toContain('the mail sink does not start beside it');
});

test.each([
  ['127.0.0.1', true],
  // Every address of 127/8 is this machine: a server that listens on all addresses would answer here.
  ['127.0.0.2', false],
])('listens on 127.0.0.1 alone: %s', async (host, isOpen) => {
  const page = Number(sink().port);
  for (const port of [page - 1, page]) {
    const answers = await new Promise((done) => {
      const socket = connect(port, host, () => done(true)).on('error', () => done(false));
      socket.on('connect', () => socket.destroy());
    });
    expect(answers, `port ${port}`).toBe(isOpen);
  }
});

test.each([
  ['127.0.0.1', 200],
  ['localhost', 200],
  ['evil.example', 403],
  ['127.0.0.1.evil.example', 403],
])('its page answers only under this machine’s names: %s', async (host, status) => {
  const { hostname, port } = sink();
  const answered = await new Promise((done, failed) => {
    request({ hostname, port, path: '/messages.json', headers: { host } }, (answer) => {
      answer.resume();
      done(answer.statusCode);
    })
      .on('error', failed)
      .end();
  });
  expect(answered).toBe(status);
});
