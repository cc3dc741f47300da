/**
 * What a proxy would say about a request, rewritten before anything reads it: nobody but the named proxy is
 * believed, and of that one only what it has itself added.
 */
import type { IncomingHttpHeaders } from 'node:http';

const CLAIMS = ['forwarded', 'x-forwarded-host', 'x-forwarded-port', 'x-forwarded-proto', 'x-real-ip'];

/** The last address of X-Forwarded-For stays where a proxy is named; the protocol is that of APP_URL. */
export function rewriteForwarded(
  headers: IncomingHttpHeaders,
  settings: { behindProxy: boolean; appUrl: string },
): void {
  for (const name of CLAIMS) delete headers[name];
  const last = String(headers['x-forwarded-for'] ?? '')
    .split(',')
    .at(-1)
    ?.trim();
  delete headers['x-forwarded-for'];
  if (settings.behindProxy && last) headers['x-forwarded-for'] = last;
  headers['x-forwarded-proto'] = new URL(settings.appUrl).protocol.replace(':', '');
}
