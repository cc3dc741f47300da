import { describe, expect, test } from 'vitest';
import { COMMON_PASSWORDS, COMMON_WORDS } from './commonPasswords.ts';
import { hashPassword, newPasswordFault, passwordMatches, PASSWORD_MOST_CHARACTERS } from './passwords.ts';

describe('a new password', () => {
  const unlike = 'zephyr quill mosaic tundra vortex ';

  test.each([
    ['14 characters', 'osier fathom k', 'Use at least 15 characters; this has 14.'],
    ['15 characters', 'osier fathom ke', null],
    ['15 signs outside the basic plane, which count once each', '🜁🜂🜃🜄🜔🜕🜖🜗🜘🜙🜚🜛🜜🜝🜞'.concat('osier'), null],
    ['128 characters', unlike.repeat(4).slice(0, 128), null],
    ['129 characters', unlike.repeat(4).slice(0, 129), 'Use at most 128 characters; this has 129.'],
  ])('is held to its length: %s', (_what, password, fault) => {
    expect(newPasswordFault(password, [])).toBe(fault);
  });

  test.each([...COMMON_PASSWORDS].filter((_password, place) => place % 7 === 0))(
    'is none of the common ones: %s',
    (password) => {
      expect(newPasswordFault(password, [])).not.toBeNull();
      expect(newPasswordFault(password.toUpperCase(), [])).not.toBeNull();
    },
  );

  test.each([
    'passwordpassword',
    'Password12345678',
    'Welcome2026!!!!!',
    'qwertyuiop123456',
    'aaaaaaaaaaaaaaaa',
    'abcabcabcabcabcabc',
    '1234567890123456789',
    'Spring2026Summer2026',
    'Underkeel-2026-admin',
  ])('is not put together from words, runs and repeats alone: %s', (password) => {
    expect(newPasswordFault(password, [])).toContain('only common words');
  });

  test('is not the person’s own name or address', () => {
    expect(newPasswordFault('Adalbert.Northcote1', ['Adalbert', 'Northcote'])).toContain('only common words');
    expect(newPasswordFault('Adalbert.Northcote1', [])).toBeNull();
  });

  test('may be four words, twenty random digits, or hold spaces at its ends', () => {
    expect(newPasswordFault('kettle marble fathom osier', [])).toBeNull();
    expect(newPasswordFault('83920174659203847561', [])).toBeNull();
    expect(newPasswordFault(' osier fathom k ', [])).toBeNull();
  });

  test('is held against lists of the size that their comment states', () => {
    expect(COMMON_PASSWORDS.size).toBe(150);
    expect(COMMON_WORDS).toHaveLength(281);
    expect([...COMMON_PASSWORDS].filter((password) => [...password].length < 15)).toEqual([]);
  });
});

describe('checking a password', () => {
  test('takes it as received: spaces, case and the form of letters count', async () => {
    const password = ' Café fathom osier ';
    const stored = await hashPassword(password);
    expect(await passwordMatches(password, stored)).toBe(true);
    for (const other of [password.trim(), password.toLowerCase(), password.normalize('NFD')])
      expect(await passwordMatches(other, stored), JSON.stringify(other)).toBe(false);
  });

  test('tells apart two of the greatest length that differ in the last character', async () => {
    const long = 'x'.repeat(PASSWORD_MOST_CHARACTERS - 1);
    expect(await passwordMatches(`${long}b`, await hashPassword(`${long}a`))).toBe(false);
  });

  test('never matches where there is no stored password', async () => {
    expect(await passwordMatches('', null)).toBe(false);
    for (const stored of ['', 'plain text', '$argon2id$v=19$m=19456,t=2,p=1$short$short'])
      expect(await passwordMatches('plain text', stored)).toBe(false);
  });

  test('runs twenty at once in turn and finishes them all', async () => {
    const stored = await hashPassword('kettle marble fathom osier');
    const all = await Promise.all(
      Array.from({ length: 20 }, (_, n) =>
        passwordMatches(n % 2 === 0 ? 'kettle marble fathom osier' : 'no', stored),
      ),
    );
    expect(all).toEqual(Array.from({ length: 20 }, (_, n) => n % 2 === 0));
  });
});
