import { describe, expect, test } from 'vitest';
import { keyIsFree, nextRow } from './keys.ts';

describe('j and k', () => {
  test('start at the first row where none is selected', () => {
    expect(nextRow('j', null, 3)).toBe(0);
    expect(nextRow('k', null, 3)).toBe(0);
  });

  test('move by one and stay inside the list', () => {
    expect(nextRow('j', 1, 3)).toBe(2);
    expect(nextRow('j', 2, 3)).toBe(2);
    expect(nextRow('k', 1, 3)).toBe(0);
    expect(nextRow('k', 0, 3)).toBe(0);
  });

  test('do nothing in an empty list', () => {
    expect(nextRow('j', null, 0)).toBeNull();
  });
});

describe('a key', () => {
  const event = (target: object | null, more: object = {}) =>
    ({ target, altKey: false, ctrlKey: false, metaKey: false, ...more }) as unknown as KeyboardEvent;
  const inside = (found: boolean) => ({ closest: () => (found ? {} : null) });

  test('belongs to the page where nobody types', () => {
    expect(keyIsFree(event(inside(false)))).toBe(true);
    expect(keyIsFree(event(null))).toBe(true);
  });

  test('belongs to the field while somebody types, and to the browser with a modifier', () => {
    expect(keyIsFree(event(inside(true)))).toBe(false);
    expect(keyIsFree(event(inside(false), { ctrlKey: true }))).toBe(false);
    expect(keyIsFree(event(inside(false), { metaKey: true }))).toBe(false);
    expect(keyIsFree(event(inside(false), { altKey: true }))).toBe(false);
  });
});
