/** How much a request may carry: refused by what it declares, and again by what arrives. */
import type { IncomingMessage } from 'node:http';

const MEGABYTE = 1024 * 1024;
export const BODY_BYTES_MOST = MEGABYTE;
/** A file of 10 MB and the form around it. */
export const UPLOAD_BYTES_MOST = 11 * MEGABYTE;

/** The one address that takes a file: anywhere else 11 MB would be a way to fill the memory without signing in. */
const UPLOAD_ADDRESS = /^\/api\/v1\/imports\/?(\?|$)/;

export function isUpload({ headers, url = '' }: Pick<IncomingMessage, 'headers' | 'url'>): boolean {
  return UPLOAD_ADDRESS.test(url) && /^multipart\/form-data\b/i.test(headers['content-type'] ?? '');
}

export const bodyBytesMost = (request: Pick<IncomingMessage, 'headers' | 'url'>): number =>
  isUpload(request) ? UPLOAD_BYTES_MOST : BODY_BYTES_MOST;

/** Does the request itself say that it carries too much? */
export const declaresTooMuch = (request: Pick<IncomingMessage, 'headers'>, most: number): boolean =>
  Number(request.headers['content-length'] ?? 0) > most;

/** Passes the body on piece by piece; past the limit it calls `refuse` and ends in an error. */
export async function* counted(
  body: AsyncIterable<Uint8Array>,
  most: number,
  refuse: () => void,
): AsyncGenerator<Uint8Array> {
  let bytes = 0;
  for await (const piece of body) {
    bytes += piece.byteLength;
    if (bytes > most) {
      refuse();
      throw new Error(`the request's body is larger than ${most} bytes`);
    }
    yield piece;
  }
}
