/** Sessions by the SHA-256 of their token; `expires_at` is the end that no use can move. */
import type { Transaction } from 'sequelize';
import { execute, selectOne } from '../sql.ts';
import { ROLES_AND_DESKS, toPersonRecord, type PersonRecord, type PersonRow } from './people.ts';

export interface SessionRecord {
  readonly id: string;
  readonly createdAt: Date;
  readonly lastSeenAt: Date;
  readonly expiresAt: Date;
  readonly person: PersonRecord;
}

/** The session with the person as the database has them at this moment; nobody where the person is not active. */
export async function findSession(tx: Transaction, id: string): Promise<SessionRecord | null> {
  const row = await selectOne<
    PersonRow & { session_id: string; created_at: Date; last_seen_at: Date; expires_at: Date }
  >(
    tx,
    `select s.id as session_id, s.created_at, s.last_seen_at, s.expires_at,
       p.id, p.name, p.email, p.is_active, ${ROLES_AND_DESKS}
     from sessions s join people p on p.id = s.person_id
     where s.id = :id and p.is_active = 1`,
    { id },
  );
  return (
    row && {
      id: row.session_id,
      createdAt: row.created_at,
      lastSeenAt: row.last_seen_at,
      expiresAt: row.expires_at,
      person: toPersonRecord(row),
    }
  );
}

export async function insertSession(
  tx: Transaction,
  session: { id: string; personId: number; createdAt: Date; expiresAt: Date },
): Promise<void> {
  await execute(
    tx,
    `insert into sessions (id, person_id, created_at, last_seen_at, expires_at)
     values (:id, :personId, :createdAt, :createdAt, :expiresAt)`,
    session,
  );
}

export async function touchSession(tx: Transaction, id: string, now: Date): Promise<void> {
  await execute(tx, 'update sessions set last_seen_at = :now where id = :id', { id, now });
}

export async function deleteSession(tx: Transaction, id: string): Promise<boolean> {
  return (await execute(tx, 'delete from sessions where id = :id', { id })).affectedRows === 1;
}

/** Ends every session of the person, or every one but `keepId`; answers how many. */
export async function deleteSessionsOf(
  tx: Transaction,
  personId: number,
  keepId: string | null,
): Promise<number> {
  const { affectedRows } = await execute(
    tx,
    'delete from sessions where person_id = :personId and id <> :keepId',
    { personId, keepId: keepId ?? '' },
  );
  return affectedRows;
}

export async function countSessionsOf(tx: Transaction, personId: number, now: Date): Promise<number> {
  const row = await selectOne<{ n: number }>(
    tx,
    'select count(*) as n from sessions where person_id = :personId and expires_at > :now',
    { personId, now },
  );
  return row?.n ?? 0;
}

export async function deleteExpiredSessions(tx: Transaction, now: Date): Promise<void> {
  await execute(tx, 'delete from sessions where expires_at <= :now', { now });
}
