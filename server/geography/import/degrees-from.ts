import proj4 from 'proj4'
import { AreaFileRefused } from './area-file'

export interface ToDegrees {
  place: (x: number, y: number) => [lon: number, lat: number]
  /** Said where the numbers were changed. */
  note: string | null
}

/** From the coordinate system a .prj names (WKT) to longitude and latitude in WGS84. */
export function degreesFrom(wkt: string): ToDegrees {
  const name = /^\s*\w+\s*\[\s*"([^"]{1,80})/.exec(wkt)?.[1] ?? 'a coordinate system without a name'
  const unknown = () => new AreaFileRefused(`The .prj names ${name}, which cannot be turned into longitude and latitude here. Write the shapefile out in WGS84 (EPSG:4326).`)
  if (/^\s*GEOG(CS|CRS)\s*\[/i.test(wkt) && /WGS_?\s?(19)?84/i.test(name)) return { place: (x, y) => [x, y], note: null }
  let converter: proj4.Converter
  try {
    converter = proj4(wkt)
    converter.inverse([0, 0])
  } catch {
    throw unknown()
  }
  return {
    place: (x, y) => {
      if (!Number.isFinite(x) || !Number.isFinite(y)) return [NaN, NaN]
      const [lon = NaN, lat = NaN] = converter.inverse([x, y])
      return [lon, lat]
    },
    note: `corners were brought from ${name} to longitude and latitude in WGS84.`,
  }
}
