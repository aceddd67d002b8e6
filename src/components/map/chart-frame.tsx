import { createPortal } from 'react-dom'
import { degrees } from '../../lib/format'
import { stepMinutes, stepsWithin } from './graticule-steps'
import { useMapView, type MapView } from './use-map-view'

const edge = 7

/**
 * Graticule over the map and the graduated frame round it, drawn into an element as large as the map (which clips what is
 * in it). One segment is a whole number of minutes of arc.
 */
export function ChartFrame({ into }: { into: HTMLElement }) {
  const view = useMapView()
  if (view.width === 0) return null
  const pxPerDegree = view.width / (view.east - view.west)
  const segment = stepMinutes(pxPerDegree, 14)
  const labels = labelStep(segment, pxPerDegree)
  return createPortal(
    <svg aria-hidden className="absolute top-0 left-0 overflow-visible" width={view.width} height={view.height}>
      <Graticule view={view} minutes={labels} />
      <Edges view={view} minutes={segment} />
    </svg>,
    into,
  )
}

/** Labels stand on segment ends, at least 84 px apart. */
function labelStep(segment: number, pxPerDegree: number): number {
  const wanted = stepMinutes(pxPerDegree, 84)
  return Math.ceil(wanted / segment) * segment
}

function Graticule({ view, minutes }: { view: MapView; minutes: number }) {
  const meridians = stepsWithin(view.west, view.east, minutes).filter(({ at }) => at > view.west)
  const parallels = stepsWithin(view.south, view.north, minutes).filter(({ at }) => at > view.south)
  return (
    <g className="map-graticule">
      {meridians.map(({ at }) => {
        const x = Math.round(view.x(at)) + 0.5
        return (
          <g key={at}>
            <line x1={x} x2={x} y1={0} y2={view.height} />
            {x > 14 && x < view.width - 8 && (
              <text x={x} y={view.height + edge + 15} textAnchor="middle">
                {degrees(at, 'longitude')}
              </text>
            )}
          </g>
        )
      })}
      {parallels.map(({ at }) => {
        const y = Math.round(view.y(at)) + 0.5
        return (
          <g key={at}>
            <line x1={0} x2={view.width} y1={y} y2={y} />
            {y > 6 && y < view.height - 4 && (
              <text x={-edge - 5} y={y + 4} textAnchor="end">
                {degrees(at, 'latitude')}
              </text>
            )}
          </g>
        )
      })}
    </g>
  )
}

function Edges({ view, minutes }: { view: MapView; minutes: number }) {
  const { width, height } = view
  const step = minutes / 60
  const across = stepsWithin(view.west, view.east, minutes).filter((s) => s.inked)
  const down = stepsWithin(view.south, view.north, minutes).filter((s) => s.inked)
  return (
    <g>
      <path
        className="map-frame-paper"
        fillRule="evenodd"
        d={`M${-edge} ${-edge}h${width + 2 * edge}v${height + 2 * edge}h${-width - 2 * edge}zM0 0v${height}h${width}v${-height}z`}
      />
      <g className="map-frame-ink">
        {across.map(({ at }) => {
          const from = Math.max(0, view.x(at))
          const to = Math.min(width, view.x(at + step))
          return (
            <g key={at}>
              <rect x={from} y={-edge + 1} width={Math.max(0, to - from)} height={edge - 1} />
              <rect x={from} y={height} width={Math.max(0, to - from)} height={edge - 1} />
            </g>
          )
        })}
        {down.map(({ at }) => {
          const from = Math.max(0, view.y(at + step))
          const to = Math.min(height, view.y(at))
          return (
            <g key={at}>
              <rect x={-edge + 1} y={from} width={edge - 1} height={Math.max(0, to - from)} />
              <rect x={width} y={from} width={edge - 1} height={Math.max(0, to - from)} />
            </g>
          )
        })}
      </g>
      <rect className="map-neatline" x={-edge + 0.5} y={-edge + 0.5} width={width + 2 * edge - 1} height={height + 2 * edge - 1} />
      <rect className="map-neatline" x={-0.5} y={-0.5} width={width + 1} height={height + 1} />
    </g>
  )
}
