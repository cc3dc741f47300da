import busboy from 'busboy';
import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import { err, ok, type Result } from '../../core/result.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import { UPLOAD_MOST_BYTES } from '../../contracts/imports.ts';
import { mediaType } from './request.ts';

export interface UploadForm {
  readonly fields: ReadonlyMap<string, string>;
  readonly file: { readonly name: string; readonly bytes: Buffer };
}

/** Reads a form with one file while it arrives; what is too large is refused before it is all here. */
export async function readUpload(request: Request): Promise<Result<UploadForm, ServiceProblem>> {
  const type = request.headers.get('content-type') ?? '';
  if (mediaType(request) !== 'multipart/form-data' || !/boundary=./i.test(type) || !request.body)
    return invalid('file', 'Send the file as a form (multipart/form-data).');
  const fields = new Map<string, string>();
  const files: { name: string; chunks: Buffer[]; cut: boolean }[] = [];
  const form = busboy({
    headers: { 'content-type': type },
    defParamCharset: 'utf8',
    limits: { files: 1, fileSize: UPLOAD_MOST_BYTES, fields: 10, fieldSize: 2_000, parts: 12 },
  });
  const twice: string[] = [];
  form.on('filesLimit', () => twice.push('file'));
  form.on('field', (name, value) => {
    if (fields.has(name)) twice.push(name.slice(0, 60));
    fields.set(name, value);
  });
  form.on('file', (_name, stream, info) => {
    const file = { name: info.filename ?? '', chunks: [] as Buffer[], cut: false };
    files.push(file);
    stream.on('data', (chunk: Buffer) => file.chunks.push(chunk));
    stream.on('limit', () => {
      file.cut = true;
    });
  });
  try {
    await new Promise((done, failed) => {
      form.once('close', done).once('error', failed);
      Readable.fromWeb(request.body as ReadableStream)
        .once('error', failed)
        .pipe(form);
    });
  } catch (error) {
    if (!(error instanceof Error)) throw error;
    return invalid('file', `The upload broke off (${error.message}). Send the file again.`);
  }
  const [repeated] = twice;
  if (repeated !== undefined)
    return invalid(
      repeated,
      `${repeated} came more than once, and which one counts would be a guess. Send it once.`,
    );
  const [file] = files;
  if (!file || file.name === '')
    return invalid('file', 'No file came with the form. Choose one and send it again.');
  if (file.cut)
    return invalid(
      'file',
      `The file is larger than ${UPLOAD_MOST_BYTES / 1024 / 1024} MB. Save a copy without pictures, or send the sheets apart.`,
    );
  return ok({ fields, file: { name: safeName(file.name), bytes: Buffer.concat(file.chunks) } });
}

/** Only for display: the name that a file was sent under never names anything on disk. */
const safeName = (name: string): string =>
  name
    .replaceAll(/[\p{C}\\/]/gu, '_')
    .trim()
    .slice(0, 200) || 'unnamed';

const invalid = (field: string, message: string) =>
  err({
    kind: 'invalid' as const,
    detail: `${message} Nothing was imported.`,
    errors: [{ field, code: 'invalid', message }],
  });
