import type { Theme } from '../../../shared/ramps'
import { endpoints } from '../../../shared/schemas/endpoints'

/** The address of a layer's tiles, with {z}, {x} and {y} left open. */
export function tileTemplate(layerId: number, theme: Theme): string {
  const path = endpoints.layerTile.path.replace(':id', String(layerId)).replace(':z', '{z}').replace(':x', '{x}').replace(':y', '{y}')
  return `/api${path}?theme=${theme}`
}

interface View {
  west: number
  south: number
  east: number
  north: number
  zoom: number
}

/** The addresses of the tiles that cover a view, as a map asks for them: whole zooms, columns wrapped round the globe. */
export function tilesOfView(layerId: number, theme: Theme, { west, south, east, north, zoom }: View): string[] {
  const z = Math.max(0, Math.min(14, Math.round(zoom)))
  const across = 2 ** z
  const column = (longitude: number) => Math.floor(((longitude + 180) / 360) * across)
  const row = (latitude: number) => {
    const clipped = Math.min(85.05, Math.max(-85.05, latitude)) * (Math.PI / 180)
    return Math.min(across - 1, Math.max(0, Math.floor(((1 - Math.asinh(Math.tan(clipped)) / Math.PI) / 2) * across)))
  }
  const template = tileTemplate(layerId, theme)
  const addresses = new Set<string>()
  for (let x = column(west); x <= Math.min(column(east), column(west) + across - 1); x++) {
    for (let y = row(north); y <= row(south); y++) {
      const wrapped = ((x % across) + across) % across
      addresses.add(template.replace('{z}', String(z)).replace('{x}', String(wrapped)).replace('{y}', String(y)))
    }
  }
  return [...addresses]
}
