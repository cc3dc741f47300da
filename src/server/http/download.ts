export const XLSX = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

/** A file to be kept, never shown in the page's place and never stored on the way. */
export const download = (bytes: Uint8Array, fileName: string, mediaType: string): Response =>
  new Response(new Uint8Array(bytes), {
    headers: {
      'content-type': mediaType,
      'content-disposition': attachment(fileName),
      'cache-control': 'no-store',
    },
  });

/**
 * The name twice, as RFC 6266 asks: in plain ASCII for old readers, and in full as RFC 8187 encodes it. Neither
 * holds a quote, a line break or a path.
 */
export function attachment(fileName: string): string {
  const name = fileName.replaceAll(/[\p{C}\\/:*?"<>|]+/gu, '_').trim();
  const ascii = name
    .normalize('NFKD')
    .replaceAll(/\p{M}/gu, '')
    .replaceAll(/[^A-Za-z0-9 ._-]/g, '_');
  const full = encodeURIComponent(name).replaceAll(
    /[!'()*]/g,
    (mark) => `%${mark.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${ascii}"; filename*=UTF-8''${full}`;
}
