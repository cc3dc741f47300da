import { describe, expect, test } from 'vitest';
import { idempotencyKey, readJson, repeatedName } from './request.ts';

const asked = (headers: Record<string, string>, body?: string) =>
  new Request('http://127.0.0.1/', { method: 'POST', headers, ...(body !== undefined && { body }) });

describe('an Idempotency-Key', () => {
  test.each([
    ['of one character', 'k', true],
    ['of 100 characters', 'k'.repeat(100), true],
    ['of 101 characters', 'k'.repeat(101), false],
    ['with a space inside', 'a b', false],
    ['with a letter outside ASCII', 'é', false],
  ])('%s', (_what, key, isGood) => {
    expect(idempotencyKey(asked({ 'idempotency-key': key })).ok).toBe(isGood);
  });

  test('may be left out', () => {
    expect(idempotencyKey(asked({}))).toEqual({ ok: true, value: null });
  });
});

test('a name that is given twice is found, whatever stands between', () => {
  expect(repeatedName(new URLSearchParams('desk=1&sort=due&desk=2'))).toBe('desk');
  expect(repeatedName(new URLSearchParams('desk=1&sort=due'))).toBeNull();
});

describe('a JSON body', () => {
  test.each([
    ['application/json', '{"a":1}', { ok: true, value: { a: 1 } }],
    ['Application/JSON; charset=utf-8', '{}', { ok: true, value: {} }],
    ['application/jsonp', '{}', { ok: false, error: { status: 415 } }],
    ['text/plain', '{}', { ok: false, error: { status: 415 } }],
    ['application/json', '{"a":', { ok: false, error: { status: 400 } }],
    ['application/json', '', { ok: false, error: { status: 400 } }],
  ])('of type %s: %s', async (type, body, result) => {
    expect(await readJson(asked({ 'content-type': type }, body))).toMatchObject(result);
  });
});
