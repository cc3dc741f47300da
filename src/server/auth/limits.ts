/**
 * How often may somebody try? Counters in the database, so that several servers share them and a restart forgets
 * nothing. Three counters guard a sign-in: account and address together, the address alone, the account alone.
 *
 * The last would let a stranger lock a person out from afar; so an address from which the person has signed in
 * during the last thirty days does not ask it. Every counter ends by itself, and a refused try does not prolong it.
 */
import { createHash } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { networkOf } from './networkOf.ts';
import { mailKey } from '../db/repositories/people.ts';
import { addPoints, deleteCounter, findCounter } from '../db/repositories/rateLimits.ts';

export interface Limit {
  readonly name: string;
  readonly points: number;
  readonly windowSeconds: number;
}

const QUARTER_HOUR = 900;

export const SIGN_IN_HERE: Limit = { name: 'sign-in-here', points: 10, windowSeconds: QUARTER_HOUR };
const SIGN_IN_ADDRESS: Limit = { name: 'sign-in-address', points: 100, windowSeconds: QUARTER_HOUR };
const SIGN_IN_ACCOUNT: Limit = { name: 'sign-in-account', points: 50, windowSeconds: QUARTER_HOUR };
export const FORGOT_ADDRESS: Limit = { name: 'forgot-address', points: 20, windowSeconds: 3_600 };
export const FORGOT_ACCOUNT: Limit = { name: 'forgot-account', points: 3, windowSeconds: 3_600 };
export const ONE_TIME_LINK: Limit = { name: 'one-time-link', points: 30, windowSeconds: QUARTER_HOUR };
/** A workbook costs work, and a person reads one at a time. */
export const REVIEW_EXPORTS: Limit = { name: 'review-exports', points: 30, windowSeconds: 60 };

const KNOWN_ADDRESS: Limit = { name: 'known-address', points: 1, windowSeconds: 30 * 86_400 };

/** Counts one try; answers the seconds to wait where there are too many, or null. */
export async function countTry(
  tx: Transaction,
  limit: Limit,
  who: string,
  now: Date,
): Promise<number | null> {
  const nowMs = now.getTime();
  const endsAtMs = nowMs + limit.windowSeconds * 1_000;
  const after = await addPoints(tx, { key: keyOf(limit, who), points: 1, nowMs, endsAtMs });
  return after.points > limit.points ? secondsUntil(after.endsAtMs, nowMs) : null;
}

/** Counts one try to sign in; answers the seconds to wait, or null where the password may be looked at. */
export async function countSignIn(
  tx: Transaction,
  account: string,
  address: string,
  now: Date,
): Promise<number | null> {
  const here = accountAt(account, address);
  const byAddress = await countTry(tx, SIGN_IN_ADDRESS, address, now);
  const byBoth = await countTry(tx, SIGN_IN_HERE, here, now);
  const byAccount = await countTry(tx, SIGN_IN_ACCOUNT, mailKey(account), now);
  // Looked up last: a transaction that has looked may lock nothing that others have counted since.
  const isKnown = (await findCounter(tx, keyOf(KNOWN_ADDRESS, here), now.getTime())) !== null;
  const waits = [byAddress, byBoth, isKnown ? null : byAccount].filter((wait) => wait !== null);
  return waits.length === 0 ? null : Math.max(...waits);
}

/** After the right password: the tries of this person count no longer, and the address is theirs for a while. */
export async function forgiveSignIn(
  tx: Transaction,
  account: string,
  address: string,
  now: Date,
): Promise<void> {
  const here = accountAt(account, address);
  const nowMs = now.getTime();
  // In the order in which they were counted, so that two sign-ins wait for and never against each other.
  await addPoints(tx, { key: keyOf(SIGN_IN_ADDRESS, address), points: -1, nowMs, endsAtMs: nowMs });
  await deleteCounter(tx, keyOf(SIGN_IN_HERE, here));
  await deleteCounter(tx, keyOf(KNOWN_ADDRESS, here));
  await addPoints(tx, {
    key: keyOf(KNOWN_ADDRESS, here),
    points: 1,
    nowMs,
    endsAtMs: nowMs + KNOWN_ADDRESS.windowSeconds * 1_000,
  });
}

const accountAt = (account: string, address: string): string => `${mailKey(account)} ${networkOf(address)}`;

/** Hashed: what people type into the name field is at times their password. */
const keyOf = (limit: Limit, who: string): string =>
  `${limit.name}:${createHash('sha256').update(networkOf(who)).digest('hex')}`;

const secondsUntil = (endsAtMs: number, nowMs: number): number =>
  Math.max(1, Math.ceil((endsAtMs - nowMs) / 1_000));
