export function DemoTag() {
  return (
    <span title="All people, places and figures are invented" className="fig border border-dashed border-ink3 px-2.5 py-0.5 text-small font-heading text-ink2">
      demo
    </span>
  )
}
