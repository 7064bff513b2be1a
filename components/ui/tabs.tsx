type Tab = { label: string; href: string; current: boolean }

/** The row of tabs at the bottom, 64 px; the current one is a block by day, plate and bar at night. */
export function Tabs({ tabs, label }: { tabs: readonly Tab[]; label: string }) {
  return (
    <nav aria-label={label} className="no-print flex flex-wrap border-t-2 border-ink bg-ground">
      {tabs.map((tab) => (
        <a
          key={tab.href}
          href={tab.href}
          className="tab"
          aria-current={tab.current ? 'page' : undefined}
        >
          {tab.label}
        </a>
      ))}
    </nav>
  )
}
