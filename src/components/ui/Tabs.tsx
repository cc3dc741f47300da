interface Tab {
  readonly key: string;
  readonly name: string;
  readonly href: string;
  readonly count?: number | null;
}

interface TabsProps {
  readonly label: string;
  readonly tabs: readonly Tab[];
  readonly active: string;
}

/** Parts of one subject, each with an address of its own. */
export function Tabs({ label, tabs, active }: TabsProps) {
  return (
    <nav className="tabs" aria-label={label}>
      {tabs.map((tab) => (
        <a
          key={tab.key}
          className="tab"
          href={tab.href}
          aria-current={tab.key === active ? 'page' : undefined}
        >
          {tab.name}
          {tab.count ? ` ${tab.count}` : ''}
        </a>
      ))}
    </nav>
  );
}
