import { Ladder } from './Ladder.tsx';
import type { Section, SectionCounts, SectionKey } from './sections.ts';

interface SectionLinksProps {
  readonly sections: readonly Section[];
  readonly active: SectionKey | null;
  /** Printed beside the name; nothing where the page does not know, and no nought beside Policy. */
  readonly counts: SectionCounts;
  readonly folded?: boolean;
}

export function SectionLinks({ sections, active, counts, folded = false }: SectionLinksProps) {
  return sections.map((section) => (
    <a
      key={section.key}
      href={section.href}
      className={folded ? 'section-link min-h-11' : 'section-link'}
      aria-current={section.key === active ? 'page' : undefined}
    >
      {section.name}
      <SectionCount section={section.key} count={counts[section.key] ?? null} />
      {section.key === active && !folded && <Ladder />}
    </a>
  ));
}

const COUNTED: Readonly<Partial<Record<SectionKey, string>>> = { alerts: 'open', policy: 'to decide' };

function SectionCount({ section, count }: { readonly section: SectionKey; readonly count: number | null }) {
  if (count === null || (section === 'policy' && count === 0)) return null;
  return (
    <span className="section-count">
      {count}
      <span className="sr-only"> {COUNTED[section]}</span>
    </span>
  );
}
