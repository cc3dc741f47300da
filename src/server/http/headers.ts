/** Headers of every response. A page brings its own content security policy, with the hashes of its islands. */
import { env } from '../config/env.ts';

const ONE_YEAR_SECONDS = 31_536_000;

/** For what is not a page: nothing may load, run or frame it. */
const NOT_A_PAGE = "default-src 'none'; frame-ancestors 'none'; base-uri 'none'; form-action 'none'; sandbox";

/** For a page that is drawn without one of its own. */
const PLAIN_PAGE =
  "default-src 'none'; style-src 'self'; font-src 'self'; img-src 'self' data:; form-action 'self'; base-uri 'none'; object-src 'none'; frame-ancestors 'none'";

/**
 * Referrer-Policy is same-origin and not no-referrer: under no-referrer a browser sends `Origin: null` with the
 * product's own forms, which the origin check has to refuse. Other sites learn nothing under either.
 */
export function setMissingHeaders(headers: Headers, isDevelopment: boolean): void {
  const type = headers.get('content-type') ?? '';
  if (type === 'text/html') headers.set('content-type', 'text/html; charset=utf-8');
  headers.set('x-content-type-options', 'nosniff');
  headers.set('referrer-policy', 'same-origin');
  headers.set('cross-origin-opener-policy', 'same-origin');
  headers.set('cross-origin-resource-policy', 'same-origin');
  if (!headers.has('cache-control')) headers.set('cache-control', 'no-store');
  if (new URL(env().APP_URL).protocol === 'https:')
    headers.set('strict-transport-security', `max-age=${ONE_YEAR_SECONDS}; includeSubDomains`);
  const isPage = type.startsWith('text/html');
  if (headers.has('content-security-policy') || (isPage && isDevelopment)) return;
  headers.set('content-security-policy', isPage ? PLAIN_PAGE : NOT_A_PAGE);
}
