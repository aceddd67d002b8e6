/** Figures on their way: lines of hatch where they will stand. */
export function Waiting({ lines = 3, label = 'Waiting for figures' }: { lines?: number; label?: string }) {
  return (
    <div role="status" className="grid gap-3 py-2">
      <span className="heard">{label}</span>
      {Array.from({ length: lines }, (_, line) => (
        <div key={line} aria-hidden className="hatch-fine h-3 opacity-70" style={{ width: `${100 - (line % 3) * 18}%` }} />
      ))}
    </div>
  )
}
