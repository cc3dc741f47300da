/**
 * Sessions. lucia lives in this file only.
 *
 * The cookie carries a token of 256 random bits, the table its SHA-256. A session ends SESSION_LIFETIME_HOURS
 * after sign-in whatever happens, and SESSION_IDLE_MINUTES after it was last used; its last use is written at most
 * once a minute. Who the person is, their roles and desks are read with every request: a role that was taken away
 * is gone with the next one.
 */
import { Lucia, TimeSpan, type Adapter, type DatabaseSession, type DatabaseUser } from 'lucia';
import type { Transaction } from 'sequelize';
import { env } from '../config/env.ts';
import type { PersonRecord } from '../db/repositories/people.ts';
import {
  deleteExpiredSessions,
  deleteSession,
  deleteSessionsOf,
  findSession,
  insertSession,
  touchSession,
} from '../db/repositories/sessions.ts';
import { ROLES, type Person, type Role } from './policy.ts';
import { hasTokenShape, newToken, tokenHash } from './tokens.ts';

const TOUCH_EVERY_MS = 60_000;

export interface SignedIn {
  readonly person: Person;
  readonly deskNames: readonly string[];
  /** SHA-256 of the token: names the session without being able to use it. */
  readonly sessionId: string;
}

/** A new session; the token goes into the cookie and nowhere else. */
export async function startSession(tx: Transaction, personId: number, now: Date): Promise<string> {
  const token = newToken();
  await luciaOn(tx, now).createSession(personId, {}, { sessionId: token });
  return token;
}

/** Who the token belongs to, or nobody: unknown, ended, idle for too long, or the person is no longer active. */
export async function personOfToken(tx: Transaction, token: string, now: Date): Promise<SignedIn | null> {
  if (!hasTokenShape(token)) return null;
  const { session, user } = await luciaOn(tx, now).validateSession(token);
  if (!session) return null;
  const sessionId = tokenHash(token);
  if (now.getTime() - session.lastSeenAt.getTime() >= TOUCH_EVERY_MS) await touchSession(tx, sessionId, now);
  return { person: toPerson(user.record), deskNames: user.record.deskNames, sessionId };
}

export const endSession = (tx: Transaction, sessionId: string): Promise<boolean> =>
  deleteSession(tx, sessionId);

/** Ends all sessions of the person, or all but one; answers how many. */
export const endSessionsOf = (
  tx: Transaction,
  personId: number,
  keepId: string | null = null,
): Promise<number> => deleteSessionsOf(tx, personId, keepId);

/** A role that this version does not know gives no right. */
const toPerson = (record: PersonRecord): Person => ({
  id: record.id,
  name: record.name,
  email: record.email,
  roles: record.roles.filter((role): role is Role => (ROLES as readonly string[]).includes(role)),
  deskIds: record.deskIds,
});

/** Lucia's storage inside the caller's transaction. */
class TransactionAdapter implements Adapter {
  private readonly tx: Transaction;
  private readonly now: Date;
  constructor(tx: Transaction, now: Date) {
    this.tx = tx;
    this.now = now;
  }

  async getSessionAndUser(token: string): Promise<[DatabaseSession | null, DatabaseUser | null]> {
    const found = await findSession(this.tx, tokenHash(token));
    if (!found) return [null, null];
    const idleEnd = found.lastSeenAt.getTime() + env().SESSION_IDLE_MINUTES * 60_000;
    const expiresAt = new Date(Math.min(idleEnd, found.expiresAt.getTime()));
    if (expiresAt <= this.now) {
      await deleteSession(this.tx, found.id);
      return [null, null];
    }
    const { person } = found;
    return [
      { id: token, userId: person.id, expiresAt, attributes: { lastSeenAt: found.lastSeenAt } },
      { id: person.id, attributes: { record: person } },
    ];
  }

  async setSession(session: DatabaseSession): Promise<void> {
    await insertSession(this.tx, {
      id: tokenHash(session.id),
      personId: session.userId,
      createdAt: this.now,
      expiresAt: new Date(this.now.getTime() + lifetimeMs()),
    });
  }

  /** Lucia would stretch a session in use; here its end is fixed and last_seen_at says that it is in use. */
  updateSessionExpiration(): Promise<void> {
    return Promise.resolve();
  }

  async deleteSession(token: string): Promise<void> {
    await deleteSession(this.tx, tokenHash(token));
  }

  async deleteUserSessions(personId: number): Promise<void> {
    await deleteSessionsOf(this.tx, personId, null);
  }

  async deleteExpiredSessions(): Promise<void> {
    await deleteExpiredSessions(this.tx, this.now);
  }

  /** Never asked for: a stored session knows the hash of its token, not the token that lucia would want. */
  getUserSessions(): Promise<DatabaseSession[]> {
    return Promise.reject(new Error('sessions are counted by their repository'));
  }
}

const lifetimeMs = (): number => env().SESSION_LIFETIME_HOURS * 3_600_000;

const luciaOn = (tx: Transaction, now: Date) =>
  new Lucia(new TransactionAdapter(tx, now), {
    sessionExpiresIn: new TimeSpan(env().SESSION_LIFETIME_HOURS, 'h'),
    getSessionAttributes: ({ lastSeenAt }) => ({ lastSeenAt: lastSeenAt ?? now }),
    getUserAttributes: ({ record }) => ({ record }),
  });

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof luciaOn>;
    UserId: number;
    DatabaseUserAttributes: { record: PersonRecord };
    DatabaseSessionAttributes: { lastSeenAt?: Date };
  }
}
