import { expect, test } from 'vitest';
import { ownPath } from './ownPath.ts';

test.each([
  ['/alerts', '/alerts'],
  ['/alerts?sort=due&page=2', '/alerts?sort=due&page=2'],
  ['/borrowers/12#tests', '/borrowers/12'],
  ['/a/../alerts', '/alerts'],
])('a path of the product is kept: %s', (text, path) => {
  expect(ownPath(text, '/')).toBe(path);
});

test.each([
  '',
  null,
  undefined,
  'alerts',
  '//evil.example',
  '/\\evil.example',
  '\\\\evil.example',
  'https:evil.example',
  'https://evil.example/',
  '/\t/evil.example',
  '/\n/evil.example',
  '/a/..//evil.example',
  'javascript:alert(1)',
  '/api/v1/session/end',
  '/sign-in?next=/sign-in',
])('anything else gives way to the path given for that: %j', (text) => {
  expect(ownPath(text, '/alerts')).toBe('/alerts');
});
