/** Hatch for SVG, the same as on every other surface. Put it in <defs> and fill with `url(#id)`. */
export function HatchPattern({ id, gap = 7 }: { id: string; gap?: number }) {
  return (
    <pattern id={id} width={gap} height={gap} patternUnits="userSpaceOnUse" patternTransform="rotate(21)">
      <line x1="0.5" y1="0" x2="0.5" y2={gap} stroke="var(--rule2)" strokeWidth="1" />
    </pattern>
  )
}

/** The little hatched tile of a key line. */
export function HatchTile() {
  return <span aria-hidden className="hatch-fine mr-1.5 inline-block h-3 w-6 border border-rule2 align-[-2px]" />
}
