/**
 * Passwords: argon2id, and the rule for a new one.
 *
 * A hash takes 19 MB and some 20 ms of a thread, so at most eight run at once: a flood of sign-ins queues here and
 * not in the thread pool that answers everybody else.
 */
import { randomBytes } from 'node:crypto';
import { hash, verify } from '@node-rs/argon2';
import { COMMON_PASSWORDS, COMMON_WORDS } from './commonPasswords.ts';

/** OWASP password storage: argon2id (the package's own choice) with 19 MiB, two passes, one lane is the least. */
const ARGON2ID = {
  memoryCost: 19_456,
  timeCost: 2,
  parallelism: 1,
  outputLen: 32,
} as const;

/** A stored text that is none (an import gone wrong) would be an error, and a faster answer than a wrong password. */
const PHC_ARGON2ID = /^\$argon2id\$v=19\$m=\d+,t=\d+,p=\d+\$[A-Za-z0-9+/]{22,}\$[A-Za-z0-9+/]{43}$/;

const MOST_AT_ONCE = 8;

/** NIST SP 800-63B-4: 15 characters where the password is the only factor; no rule of composition. */
const PASSWORD_LEAST_CHARACTERS = 15;
export const PASSWORD_MOST_CHARACTERS = 128;

export const hashPassword = (password: string): Promise<string> => inTurn(() => hash(password, ARGON2ID));

/** The password is checked as received: no trimming, no change of case, no normal form. */
export async function passwordMatches(password: string, stored: string | null): Promise<boolean> {
  const dummy = await (dummyHash ??= hashPassword(randomBytes(24).toString('hex')));
  const isUsable = stored !== null && PHC_ARGON2ID.test(stored);
  const matches = await inTurn(() => verify(isUsable ? stored : dummy, password));
  return matches && isUsable;
}

/**
 * What is wrong with a new password, as a sentence that says what to do; null where nothing is.
 *
 * @example
 * newPasswordFault('correct horse', []) // 'Use at least 15 characters; this has 13.'
 */
export function newPasswordFault(password: string, ownWords: readonly string[]): string | null {
  const length = [...password].length;
  if (length < PASSWORD_LEAST_CHARACTERS)
    return `Use at least ${PASSWORD_LEAST_CHARACTERS} characters; this has ${length}.`;
  if (length > PASSWORD_MOST_CHARACTERS)
    return `Use at most ${PASSWORD_MOST_CHARACTERS} characters; this has ${length}.`;
  const plain = password.toLowerCase();
  if (COMMON_PASSWORDS.has(plain)) return 'This password is on lists of common passwords. Choose another.';
  const words = [
    ...COMMON_WORDS,
    ...ownWords.map((word) => word.toLowerCase()).filter((word) => word.length >= 3),
  ];
  if (saysLittle(plain, words))
    return 'This password is only common words, names, runs or repeats. Add words of your own that do not belong together.';
  return null;
}

/** What is left once repeats and known words are taken out: fewer than four letters and ten signs in all is little. */
function saysLittle(plain: string, words: readonly string[]): boolean {
  const longestFirst = [...words].sort((a, b) => b.length - a.length);
  let rest = plain.replaceAll(/(.{1,8}?)\1{2,}/g, '');
  for (const word of longestFirst) rest = rest.replaceAll(word, '');
  const letters = rest.replaceAll(/[\d\s\p{P}\p{S}]/gu, '').length;
  const digits = rest.replaceAll(/\D/g, '').length;
  return letters < 4 && letters + digits < 10;
}

let dummyHash: Promise<string> | null = null;
let running = 0;
const waiting: (() => void)[] = [];

async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= MOST_AT_ONCE) await new Promise<void>((resume) => waiting.push(resume));
  else running += 1;
  try {
    return await work();
  } finally {
    const next = waiting.shift();
    if (next) next();
    else running -= 1;
  }
}
