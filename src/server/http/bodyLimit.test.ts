import { expect, test, vi } from 'vitest';
import { BODY_BYTES_MOST, UPLOAD_BYTES_MOST, bodyBytesMost, counted, declaresTooMuch } from './bodyLimit.ts';

async function* pieces(...sizes: number[]): AsyncGenerator<Uint8Array> {
  for (const size of sizes) yield await Promise.resolve(new Uint8Array(size));
}

async function total(body: AsyncIterable<Uint8Array>): Promise<number> {
  let bytes = 0;
  for await (const piece of body) bytes += piece.byteLength;
  return bytes;
}

test.each([
  ['/api/v1/imports', 'multipart/form-data; boundary=x', UPLOAD_BYTES_MOST],
  ['/api/v1/imports/?from=page', 'multipart/form-data; boundary=x', UPLOAD_BYTES_MOST],
  ['/api/v1/session', 'multipart/form-data; boundary=x', BODY_BYTES_MOST],
  ['/api/v1/imports/1/answers', 'multipart/form-data; boundary=x', BODY_BYTES_MOST],
  ['/api/v1/imports', 'application/json', BODY_BYTES_MOST],
  ['/api/v1/imports', 'text/x-multipart/form-data', BODY_BYTES_MOST],
  ['/api/v1/imports', undefined, BODY_BYTES_MOST],
])('only a form with a file, sent to where files go, may carry 11 MB: %s %s', (url, type, most) => {
  expect(bodyBytesMost({ url, headers: { 'content-type': type } })).toBe(most);
});

test('a declared length at the limit passes, one byte more does not', () => {
  expect(declaresTooMuch({ headers: { 'content-length': '10' } }, 10)).toBe(false);
  expect(declaresTooMuch({ headers: { 'content-length': '11' } }, 10)).toBe(true);
  expect(declaresTooMuch({ headers: {} }, 10)).toBe(false);
});

test('a body without a length is counted: at the limit it passes whole, one byte more is refused', async () => {
  const refuse = vi.fn();
  expect(await total(counted(pieces(4, 6), 10, refuse))).toBe(10);
  expect(refuse).not.toHaveBeenCalled();
  await expect(total(counted(pieces(4, 6, 1), 10, refuse))).rejects.toThrow('larger than 10 bytes');
  expect(refuse).toHaveBeenCalledOnce();
});
