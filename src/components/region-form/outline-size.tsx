import { grouped, threeDigits } from '../../lib/format'

/** How large the outline is while it is drawn, and what to do next. */
export function OutlineSize({ areaKm2, drawing, corners }: { areaKm2: number | null; drawing: boolean; corners: number }) {
  return (
    <p aria-live="polite" className="flex min-h-8 flex-wrap items-baseline gap-x-4">
      {areaKm2 !== null && (
        <span>
          <span className="fig text-title">{areaKm2 < 1000 ? threeDigits(areaKm2) : grouped(Math.round(areaKm2))}</span> km²
        </span>
      )}
      <span className="text-ink2">{drawing ? nextStep(corners) : areaKm2 !== null && 'Drag a corner to move it; the small marks between make new ones.'}</span>
    </p>
  )
}

function nextStep(corners: number): string {
  if (corners === 0) return 'Tap or click the first corner on the map.'
  if (corners < 3) return 'Go on round the water; an outline needs three corners.'
  return 'Go on, or close it by the first corner or the button.'
}
