import { describe, expect, test } from 'vitest';
import { bookSearch, readBookLook } from './bookView.ts';

const read = (search: string) => readBookLook(new URLSearchParams(search));

describe('the address of the page', () => {
  test('names the part of the book and the width of the intervals, and comes back the same', () => {
    const search = '?measure=interest-cover&sector=25&width=3';
    const { query, width, understood } = read(search);
    expect({ query, width, understood }).toEqual({
      query: { measure: 'interest-cover', sector: '25' },
      width: '3',
      understood: true,
    });
    expect(bookSearch({ query, width })).toBe(search);
  });

  test('carries nothing in the usual view', () => {
    expect(read('')).toEqual({ query: {}, width: '2', understood: true });
    expect(bookSearch({ query: { measure: undefined, sector: undefined }, width: '2' })).toBe('');
  });

  test.each(['?measure=none', '?width=4', '?sector=', `?sector=${'x'.repeat(17)}`])(
    'falls back to the usual view and says so: %s',
    (search) => {
      expect(read(search)).toEqual({ query: {}, width: '2', understood: false });
    },
  );
});
