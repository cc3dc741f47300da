/** Files of the build and of public/, from the disk: what carries its hash in its name may be kept for good. */
import type { IncomingMessage, ServerResponse } from 'node:http';
import send from 'send';
import { setMissingHeaders } from './headers.ts';

const FOR_GOOD = 'public, max-age=31536000, immutable';
const FOR_AN_HOUR = 'public, max-age=3600';

/** Answers with the file of that name, or goes on where there is none. */
export function serveStatic(
  root: string,
  request: IncomingMessage,
  response: ServerResponse,
  goOn: () => void,
): void {
  const path = (request.url ?? '/').split('?')[0] ?? '/';
  if (path.endsWith('/') || (request.method !== 'GET' && request.method !== 'HEAD')) {
    goOn();
    return;
  }
  let isFound = false;
  send(request, path, { root, dotfiles: 'ignore', index: false, cacheControl: false })
    .on('file', () => (isFound = true))
    .on('headers', (target: ServerResponse) => {
      const headers = new Headers({ 'cache-control': path.startsWith('/_astro/') ? FOR_GOOD : FOR_AN_HOUR });
      setMissingHeaders(headers, false);
      for (const [name, value] of headers) target.setHeader(name, value);
    })
    .on('directory', goOn)
    .on('error', (error: Error) => {
      if (!isFound) goOn();
      else response.destroy(error);
    })
    .pipe(response);
}
