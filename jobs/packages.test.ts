import { expect, test } from 'vitest';
import { installPlan } from './packages.mjs';

const machine = { isRoot: false, hasApt: true, hasSudo: false };
const plan = (change: Partial<typeof machine>) =>
  installPlan({ ...machine, ...change }, ['mariadb-server'], 'the database server MariaDB');

test('root installs, and so does an account with sudo that asks for no password', () => {
  expect(plan({ isRoot: true })).toEqual({ kind: 'install', prefix: [] });
  expect(plan({ hasSudo: true })).toEqual({ kind: 'install', prefix: ['sudo', '-n'] });
});

test.each([
  { change: {}, what: 'without the right to install' },
  { change: { isRoot: true, hasApt: false }, what: 'without apt-get' },
  { change: { hasSudo: true, hasApt: false }, what: 'without apt-get, with sudo' },
])('$what the message names the command to type and DATABASE_URL', ({ change }) => {
  const answer = plan(change);
  expect(answer.kind).toBe('cannot');
  const message = 'message' in answer ? answer.message : '';
  expect(message).toContain('the database server MariaDB');
  expect(message).toContain('sudo apt-get install -y mariadb-server');
  expect(message).toContain('DATABASE_URL=mariadb://');
});

test('for what is no database DATABASE_URL is not named', () => {
  const answer = installPlan(machine, ['chromium'], 'a browser');
  expect(answer).toMatchObject({
    kind: 'cannot',
    message: expect.not.stringContaining('DATABASE_URL') as string,
  });
});
