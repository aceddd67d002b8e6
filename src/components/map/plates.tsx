import { Link } from 'react-router-dom'
import { useMap } from 'react-leaflet'
import { Mark, stateMark } from '../ui/mark'
import { placePlates, type Anchor, type PlacedPlate } from './place-plates'
import type { OutlinedRegion } from './region-outlines'
import { useMapView } from './use-map-view'

export interface PlateRegion extends OutlinedRegion {
  /** Under the name: the state, or how many times usual. */
  word: string
  to: string
}

const fullAtMost = 25
const height = 40
const small = 28

/** Name plates with leaders; past two dozen regions, and on a phone, only the mark, and the list carries the names. */
export function Plates({ regions, compact = false }: { regions: readonly PlateRegion[]; compact?: boolean }) {
  const map = useMap()
  const view = useMapView()
  const isFull = (region: PlateRegion) => !compact && (regions.length <= fullAtMost || region.state === 'unusual')
  const anchors = regions.filter(isFull).map((region): Anchor => {
    const outline = outlineOf(region).map(([longitude, latitude]) => {
      const point = map.latLngToContainerPoint([latitude, longitude])
      return [point.x, point.y] as const
    })
    return { id: region.id, outline, width: 46 + Math.max(region.name.length * 7.9, region.word.length * 6.8), height }
  })
  const scaleBar = { x: view.width - 160, y: view.height - 60, width: 160, height: 60 }
  const zoomControl = { x: 0, y: 0, width: 52, height: 84 }
  const placed = new Map(placePlates(anchors, view, [scaleBar, zoomControl]).map((plate) => [plate.id, plate]))
  return (
    <div className="pointer-events-none absolute inset-0 z-[610] overflow-hidden">
      <svg aria-hidden className="absolute inset-0 size-full">
        {[...placed.values()].map(({ id, leader }) => (
          <line key={id} {...leader} stroke="var(--ink)" strokeWidth="1.2" />
        ))}
      </svg>
      {regions.map((region) => {
        const plate = placed.get(region.id)
        return plate ? <FullPlate key={region.id} region={region} plate={plate} /> : <SmallPlate key={region.id} region={region} />
      })}
    </div>
  )
}

function FullPlate({ region, plate }: { region: PlateRegion; plate: PlacedPlate }) {
  const unusual = region.state === 'unusual'
  return (
    <Link
      to={region.to}
      className={
        'pointer-events-auto absolute flex items-center gap-2 bg-paper px-2 leading-tight whitespace-nowrap text-ink hover:bg-sheet ' +
        (unusual ? 'border-2 border-ember' : 'border border-ink')
      }
      style={{ left: plate.x, top: plate.y, width: plate.width, height: plate.height }}
    >
      <Mark name={stateMark(region.state)} size={18} className={unusual ? 'text-ember' : ''} />
      <span>
        <span className="block text-small font-strong">{region.name}</span>
        <span className={`block text-fine leading-tight ${unusual ? 'font-strong text-ember' : 'text-ink2'}`}>{region.word}</span>
      </span>
    </Link>
  )
}

function SmallPlate({ region }: { region: PlateRegion }) {
  const map = useMap()
  const points = outlineOf(region).map(([longitude, latitude]) => map.latLngToContainerPoint([latitude, longitude]))
  const xs = points.map((point) => point.x)
  const ys = points.map((point) => point.y)
  const unusual = region.state === 'unusual'
  return (
    <Link
      to={region.to}
      aria-label={`${region.name}, ${region.word}`}
      className={`pointer-events-auto absolute grid place-items-center bg-paper after:absolute after:-inset-2 ${unusual ? 'border-2 border-ember text-ember' : 'border border-ink text-ink'}`}
      style={{
        left: (Math.min(...xs) + Math.max(...xs)) / 2 - small / 2,
        top: (Math.min(...ys) + Math.max(...ys)) / 2 - small / 2,
        width: small,
        height: small,
      }}
    >
      <Mark name={stateMark(region.state)} size={18} />
    </Link>
  )
}

function outlineOf(region: OutlinedRegion): [longitude: number, latitude: number][] {
  const polygons = region.geometry.type === 'Polygon' ? [region.geometry.coordinates] : region.geometry.coordinates
  return polygons.flatMap((rings) => (rings[0] ?? []).map(([longitude = 0, latitude = 0]): [number, number] => [longitude, latitude]))
}
