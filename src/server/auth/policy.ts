/**
 * Who may do what: one table, deny by default. A row that is not here is a no.
 *
 * 'desk' is yes on the person's own desks, 'all' on every desk, 'self' asks the service to hold the person
 * against the subject (owner, deputy, proposer) as well.
 */
import type { DeskScope } from '../db/deskScope.ts';

export const ROLES = [
  'analyst',
  'relationship manager',
  'committee member',
  'administrator',
  'auditor',
] as const;
export type Role = (typeof ROLES)[number];

type Reach = 'desk' | 'all';

const TABLE = {
  'read borrower': {
    analyst: 'desk',
    'relationship manager': 'desk',
    'committee member': 'all',
    auditor: 'all',
  },
  'import figures': { analyst: 'desk' },
  'check a test': { analyst: 'desk', 'relationship manager': 'desk', 'committee member': 'all' },
  'work an alert': { 'relationship manager': 'desk' },
  'hand over an alert': { analyst: 'desk', 'relationship manager': 'desk' },
  'confirm a closing': { 'relationship manager': 'desk', 'committee member': 'all' },
  'record a note': { analyst: 'desk', 'relationship manager': 'desk', 'committee member': 'all' },
  'edit borrower': { analyst: 'desk', 'relationship manager': 'desk' },
  'propose a rating': { analyst: 'desk', 'relationship manager': 'desk' },
  'decide a rating': { 'committee member': 'all' },
  propose: { analyst: 'desk', 'relationship manager': 'desk', 'committee member': 'all' },
  decide: { 'committee member': 'all' },
  'edit covenant': { analyst: 'desk', 'relationship manager': 'desk' },
  'propose destroying a file': { analyst: 'desk' },
  'confirm destroying a file': { administrator: 'all' },
  'write a review sheet': { analyst: 'desk', 'relationship manager': 'desk' },
  'sign a review sheet': { analyst: 'desk', 'relationship manager': 'desk', 'committee member': 'all' },
  administer: { administrator: 'all' },
  'propose policy': { administrator: 'all' },
  'confirm policy': { 'committee member': 'all' },
  'prepare a meeting': { 'relationship manager': 'desk' },
  'hold a meeting': { 'committee member': 'all' },
  'record a finding': { auditor: 'all' },
  'read the audit log': { 'committee member': 'all', administrator: 'all', auditor: 'all' },
} as const satisfies Record<string, Partial<Record<Role, Reach>>>;

export type Action = keyof typeof TABLE;

/** Who asks. Roles and desks are read from the database with every request. */
export interface Person {
  readonly id: number;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
  readonly deskIds: readonly number[];
}

/** The desks on which the person may do this. */
export function deskScope(person: Person, action: Action): DeskScope {
  const row: Partial<Record<Role, Reach>> = TABLE[action];
  const reaches = person.roles.map((role) => row[role]);
  if (reaches.includes('all')) return 'all';
  return reaches.includes('desk') ? person.deskIds : [];
}

/** May the person do this anywhere at all? Routes ask this first; the service asks again with the desk. */
export function mayAnywhere(person: Person, action: Action): boolean {
  const row: Partial<Record<Role, Reach>> = TABLE[action];
  return person.roles.some((role) => row[role] !== undefined);
}

export function may(person: Person, action: Action, deskId: number): boolean {
  const scope = deskScope(person, action);
  return scope === 'all' || scope.includes(deskId);
}
