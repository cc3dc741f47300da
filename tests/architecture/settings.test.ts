import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { SETTING_NAMES } from '../../src/server/config/env.ts';

test('.env.example names every setting once, and nothing else', () => {
  const text = readFileSync('.env.example', 'utf8');
  const named = [...text.matchAll(/^#? ?([A-Z][A-Z_]*)=/gm)].map(([, name]) => name);
  expect(named.toSorted()).toEqual([...SETTING_NAMES].sort());
});
