/** Secrets that travel in a cookie or a link: 256 random bits; the database sees only their SHA-256. */
import { createHash, createHmac, hkdfSync, randomBytes } from 'node:crypto';
import { env } from '../config/env.ts';

/** 256 bits in base64url are 43 characters. */
const TOKEN_SHAPE = /^[A-Za-z0-9_-]{43}$/;

export const newToken = (): string => randomBytes(32).toString('base64url');

export const tokenHash = (token: string): string => createHash('sha256').update(token).digest('hex');

export const hasTokenShape = (text: string): boolean => TOKEN_SHAPE.test(text);

/**
 * The token of a person's unsubscribe links. It is made from a key and not drawn, so that the link in an old mail
 * goes on working; the key is derived, so that the token says nothing about the key of the audit chain.
 */
export function unsubscribeToken(personId: number): string {
  const key = Buffer.from(hkdfSync('sha256', env().AUDIT_KEY, '', 'unsubscribe', 32));
  return createHmac('sha256', key).update(String(personId)).digest('base64url');
}
