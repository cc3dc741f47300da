/** The sections of the top bar. Only a section that exists stands here. */
export interface Section {
  readonly key: SectionKey;
  readonly name: string;
  readonly href: string;
}

export type SectionKey =
  'alerts' | 'watchlist' | 'borrowers' | 'imports' | 'book' | 'reviews' | 'settings' | 'policy' | 'audit';

interface SectionRule extends Section {
  /** Roles that see it; none named is everybody who reads borrowers. */
  readonly roles: readonly string[];
}

const READERS = ['analyst', 'relationship manager', 'committee member', 'auditor'];

const SECTIONS: readonly SectionRule[] = [
  { key: 'alerts', name: 'Alerts', href: '/alerts', roles: READERS },
  { key: 'watchlist', name: 'Watchlist', href: '/watchlist', roles: READERS },
  { key: 'borrowers', name: 'Borrowers', href: '/borrowers', roles: READERS },
  { key: 'imports', name: 'Imports', href: '/imports', roles: READERS },
  { key: 'book', name: 'Book', href: '/book', roles: READERS },
  { key: 'settings', name: 'Desk settings', href: '/desk-settings', roles: ['administrator'] },
  // Administrators find it among the desk settings.
  { key: 'policy', name: 'Policy', href: '/desk-settings/policy', roles: ['committee member'] },
  {
    key: 'audit',
    name: 'Audit log',
    href: '/audit-log',
    roles: ['committee member', 'administrator', 'auditor'],
  },
];

/** What stands beside a section's name: open alerts, changes of the policy that wait for this person's decision. */
export type SectionCounts = Readonly<Partial<Record<SectionKey, number | null>>>;

/** What a person with these roles sees in the top bar, in its order. The server decides again on every page. */
export function sectionsFor(roles: readonly string[]): readonly Section[] {
  return SECTIONS.filter((section) => section.roles.some((role) => roles.includes(role))).map(
    ({ key, name, href }) => ({ key, name, href }),
  );
}

export const readsBorrowers = (roles: readonly string[]): boolean =>
  READERS.some((role) => roles.includes(role));

/** "Analyst, Northern desk": the first role and the desks, as the top bar prints them. */
export function roleAndDesk(roles: readonly string[], desks: readonly string[]): string {
  const role = roles.map(sentenceCase).join(' and ') || 'No role';
  const named = desks.length > 2 ? `${desks.length} desks` : desks.join(' and ');
  return named ? `${role}, ${named}` : role;
}

const sentenceCase = (text: string, position: number): string =>
  position === 0 ? text.charAt(0).toUpperCase() + text.slice(1) : text;
