import { expect, test } from 'vitest';
import { attachment, download, XLSX } from './download.ts';

test('a plain name stands twice', () => {
  expect(attachment('Review sheet.xlsx')).toBe(
    `attachment; filename="Review sheet.xlsx"; filename*=UTF-8''Review%20sheet.xlsx`,
  );
});

test('a name with quotes, line breaks, slashes and accents is written without any of them raw', () => {
  const header = attachment('Caf\u00e9 "Bell"\r\nX: y/../\\z (1)\'s.xlsx');
  expect(header).toBe(
    `attachment; filename="Cafe _Bell_X_ y_.._z _1__s.xlsx"; filename*=UTF-8''Caf%C3%A9%20_Bell_X_%20y_.._z%20%281%29%27s.xlsx`,
  );
  expect(header).not.toMatch(/[\r\n\\/]/);
  expect(header.match(/"/g)).toHaveLength(2);
});

test('a file is kept, not shown, and not stored on the way', async () => {
  const response = download(new Uint8Array([1, 2, 3]), 'a.xlsx', XLSX);
  expect(response.headers.get('content-type')).toBe(XLSX);
  expect(response.headers.get('cache-control')).toBe('no-store');
  expect(new Uint8Array(await response.arrayBuffer())).toEqual(new Uint8Array([1, 2, 3]));
});
