import { useQuery } from '@tanstack/react-query'
import { maskInks, type MaskGround } from '../../../shared/mask-picture'
import type { GridMasks, WaterMaskShown } from '../../../shared/schemas/masks'
import { regionsQuery } from '../../api/regions'
import { boundsAround } from '../../components/map/bounds'
import { MaskTiles } from '../../components/map/mask-tiles'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap, type MapBounds } from '../../components/map/sea-map'
import { useTheme } from '../../hooks/use-theme'
import { maskName } from './mask-words'

/** A grid that spans more is shown round the watched water. */
const mostDegrees = 60

const words: Record<MaskGround, string> = {
  water: 'water',
  land: 'land',
  gained: 'water, land in the outline',
  lost: 'land, water in the outline',
}

export default function MaskMap({ grid, mask }: { grid: GridMasks; mask: WaterMaskShown }) {
  const regions = useQuery(regionsQuery()).data?.items.filter((region) => !region.retired) ?? []
  const theme = useTheme()
  const grounds = (Object.keys(words) as MaskGround[]).filter((ground) => mask.kind !== 'land outline' || ground === 'water' || ground === 'land')
  return (
    <div className="grid gap-1">
      <SeaMap label={`Water mask, ${maskName(mask)}`} bounds={boundsOf(grid, boundsAround(regions.map((region) => region.geometry)))} bareLand aspect={1.3}>
        <MaskTiles maskId={mask.id} />
        <RegionOutlines regions={regions.map(({ id, name, geometry }) => ({ id, name, geometry, state: 'usual' }))} />
      </SeaMap>
      <ul aria-label="What the map of the mask shows" className="flex flex-wrap gap-x-5 gap-y-1 pl-11 text-small text-ink2 tab:pl-13">
        {grounds.map((ground) => (
          <li key={ground} className="flex items-center gap-2">
            <span aria-hidden className="inline-block h-4 w-7 shrink-0 border border-ink2" style={{ background: swatch(maskInks[theme][ground], ground) }} />
            {words[ground]}
          </li>
        ))}
      </ul>
    </div>
  )
}

function boundsOf({ west, south, east, north }: GridMasks, watched: MapBounds | undefined): MapBounds {
  if (east - west > mostDegrees && watched) return watched
  return [
    [Math.max(-84, south), west],
    [Math.min(84, north), east],
  ]
}

function swatch({ fill, stroke }: (typeof maskInks)['light']['water'], ground: MaskGround): string {
  const [plain, line] = [fill, stroke].map((colour) => `rgb(${colour.join(' ')})`)
  if (ground === 'water' || ground === 'land') return plain!
  return `repeating-linear-gradient(${ground === 'gained' ? 135 : 45}deg, ${line} 0 1.5px, ${plain} 1.5px 4.5px)`
}
