/** So many lines are drawn; the others are counted (a choice). */
const MOST = 60

/** What is wrong, a line each, under its own heading. */
export function Lines({ title, lines }: { title: string; lines: readonly string[] }) {
  if (lines.length === 0) return null
  const more = lines.length - MOST
  return (
    <section aria-label={title} className="grid gap-1 border-l-4 border-nogo pl-3">
      <h3 className="text-row font-bold">
        {title}, {lines.length}
      </h3>
      <ul className="grid gap-1">
        {lines.slice(0, MOST).map((line) => (
          <li key={line} className="min-w-0 break-words">
            {line}
          </li>
        ))}
      </ul>
      {more > 0 ? <p>And {more} more.</p> : null}
    </section>
  )
}
