/** Stands before any evidence and is never folded away. */
export function Cautions({ cautions }: { cautions: readonly string[] }) {
  if (cautions.length === 0) return null
  return (
    <section aria-label="Caution" className="grid gap-x-3 gap-y-1 border-y border-ink py-3 tab:grid-cols-[auto_minmax(0,1fr)]">
      <h2 className="text-body font-heading">Caution</h2>
      <div className="grid gap-1">
        {cautions.map((caution) => (
          <p key={caution}>{caution}</p>
        ))}
      </div>
    </section>
  )
}
