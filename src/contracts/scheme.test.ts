import { describe, expect, test } from 'vitest';
import { schemeForm, schemeOf } from './scheme.ts';

test('a cookie that is none of the three follows the system', () => {
  expect(schemeOf('day')).toBe('day');
  expect(schemeOf('night')).toBe('night');
  expect(schemeOf('dusk')).toBe('system');
  expect(schemeOf(undefined)).toBe('system');
});

describe('after the switch', () => {
  const back = (path: string) => schemeForm.parse({ scheme: 'night', back: path }).back;

  test('the person is led back to the page, with its view', () => {
    expect(back('/alerts?kind=thin&page=2')).toBe('/alerts?kind=thin&page=2');
  });

  test.each([
    '//evil.example',
    '/\\evil.example',
    'https://evil.example',
    'alerts',
    '',
    '/a\r\nset-cookie: x=1',
  ])('and never to another place: %j', (path) => {
    expect(back(path)).toBe('/');
  });

  test('a scheme that does not exist is refused', () => {
    expect(schemeForm.safeParse({ scheme: 'dusk', back: '/' }).success).toBe(false);
  });
});
