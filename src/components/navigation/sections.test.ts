import { describe, expect, test } from 'vitest';
import { readsBorrowers, roleAndDesk, sectionsFor } from './sections.ts';

const names = (...roles: string[]) => sectionsFor(roles).map((section) => section.name);

describe('sections', () => {
  test('of those who work on borrowers are the five that exist', () => {
    for (const role of ['analyst', 'relationship manager'])
      expect(names(role)).toEqual(['Alerts', 'Watchlist', 'Borrowers', 'Imports', 'Book']);
  });

  test('of an administrator are the desk settings and the audit log, and no borrower', () => {
    expect(names('administrator')).toEqual(['Desk settings', 'Audit log']);
    expect(readsBorrowers(['administrator'])).toBe(false);
  });

  test('of auditor and committee member end with the audit log; the committee decides on the policy', () => {
    const readers = names('analyst');
    expect(names('auditor')).toEqual([...readers, 'Audit log']);
    expect(names('committee member')).toEqual([...readers, 'Policy', 'Audit log']);
  });

  test('of several roles are all of theirs, once each', () => {
    expect(names('analyst', 'administrator')).toEqual([
      'Alerts',
      'Watchlist',
      'Borrowers',
      'Imports',
      'Book',
      'Desk settings',
      'Audit log',
    ]);
  });

  test('of nobody are none', () => {
    expect(names()).toEqual([]);
    expect(names('visitor')).toEqual([]);
  });
});

test('the top bar prints role and desk', () => {
  expect(roleAndDesk(['relationship manager'], ['Northern desk'])).toBe(
    'Relationship manager, Northern desk',
  );
  expect(roleAndDesk(['analyst', 'administrator'], ['Northern desk', 'Southern desk'])).toBe(
    'Analyst and administrator, Northern desk and Southern desk',
  );
  expect(roleAndDesk(['auditor'], [])).toBe('Auditor');
  expect(roleAndDesk(['analyst'], ['A', 'B', 'C'])).toBe('Analyst, 3 desks');
});
