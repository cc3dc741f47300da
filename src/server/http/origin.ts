/**
 * Cross-site requests: whatever may change something must come from a page of this product.
 *
 * Browsers say where a request comes from in Sec-Fetch-Site, which no page can write; a browser without it (or a
 * host that it does not trust to name) sends Origin. A request with neither is refused.
 */
import { env } from '../config/env.ts';

export const SAFE_METHODS = new Set(['GET', 'HEAD', 'OPTIONS']);

/** RFC 8058: the reader's mail server posts here without a cookie; the token in the address is the permission. */
const POSTED_FROM_ELSEWHERE = '/api/v1/unsubscribe';

export const ownOrigin = (): string => new URL(env().APP_URL).origin;

export function isOwnRequest(method: string, path: string, headers: Headers, own: string): boolean {
  if (SAFE_METHODS.has(method)) return true;
  if (method === 'POST' && path === POSTED_FROM_ELSEWHERE) return true;
  const site = headers.get('sec-fetch-site');
  return site === null ? headers.get('origin') === own : site === 'same-origin';
}
