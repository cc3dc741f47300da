import { Ladder } from './Ladder.tsx';
import type { Section, SectionKey } from './sections.ts';

interface SectionLinksProps {
  readonly sections: readonly Section[];
  readonly active: SectionKey | null;
  /** Open alerts, printed beside Alerts; null where the page does not know. */
  readonly alertCount: number | null;
  readonly folded?: boolean;
}

export function SectionLinks({ sections, active, alertCount, folded = false }: SectionLinksProps) {
  return sections.map((section) => (
    <a
      key={section.key}
      href={section.href}
      className={folded ? 'section-link min-h-11' : 'section-link'}
      aria-current={section.key === active ? 'page' : undefined}
    >
      {section.name}
      {section.key === 'alerts' && alertCount !== null && (
        <span className="section-count">
          {alertCount}
          <span className="sr-only"> open</span>
        </span>
      )}
      {section.key === active && !folded && <Ladder />}
    </a>
  ));
}
