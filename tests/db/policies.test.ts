/** Which policy an assessment goes by. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { PlainDate } from '../../src/core/calendar/plainDate.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import { POLICY_VERSION_1, type Policy } from '../../src/core/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import {
  policyInForce,
  policyOfVersion,
  readPolicy,
  storedPolicy,
} from '../../src/server/db/repositories/policies.ts';
import { execute } from '../../src/server/db/sql.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const CONFIRMED = new Date('2026-12-01T10:00:00Z');
const second: Policy = { ...POLICY_VERSION_1, version: 2, thinBelow: decimal('0.123456789012345678') };

beforeAll(async () => {
  await useOwnDatabase();
});
afterAll(closeDatabase);

const inForce = (asOf: PlainDate, knownAt: Date) => inTransaction((tx) => policyInForce(tx, asOf, knownAt));

test('without another, version 1 is in force', async () => {
  expect(await inForce('2026-12-01', CONFIRMED)).toEqual(POLICY_VERSION_1);
});

test('a version that was stored before coming tests were looked at assumes what version 1 does', () => {
  const before = JSON.stringify(second, (key, value: unknown) => (key === 'outlook' ? undefined : value));
  expect(readPolicy(before)).toEqual(second);
});

test('a later version holds from its day, for whoever knows of it, with every digit of its levels', async () => {
  await inTransaction((tx) =>
    execute(
      tx,
      `insert into policies (version, content, valid_from, known_from) values (2, :content, '2026-12-15', :known)`,
      { content: storedPolicy(second), known: CONFIRMED },
    ),
  );
  expect((await inForce('2026-12-14', CONFIRMED)).version).toBe(1);
  expect(await inForce('2026-12-15', CONFIRMED)).toEqual(second);
  expect((await inForce('2026-12-15', new Date(CONFIRMED.getTime() - 1))).version).toBe(1);
});

test('a result’s own version is found by its number, whatever the day', async () => {
  const ofVersion = (version: number) => inTransaction((tx) => policyOfVersion(tx, version));
  expect(await ofVersion(1)).toEqual(POLICY_VERSION_1);
  expect(await ofVersion(2)).toEqual(second);
});

test('a value that came to the policy after a version was stored stands in it as in version 1', () => {
  const early = JSON.stringify({ version: 2, thinBelow: '0.2', repeated: { atLeast: 4 } });
  expect(readPolicy(early)).toEqual({
    ...POLICY_VERSION_1,
    version: 2,
    thinBelow: decimal('0.2'),
    repeated: { ...POLICY_VERSION_1.repeated, atLeast: 4 },
  });
});
