import type { Position } from 'geojson'

/** An outline that cannot be taken: a sentence for the person, and where on the map it is wrong. */
export class OutlineRefused extends Error {
  constructor(
    message: string,
    readonly place: Position | null = null,
    /** Set where a person may say that it is right all the same. */
    readonly reason: 'all-land' | null = null,
  ) {
    super(message)
    this.name = 'OutlineRefused'
  }
}

/** A place as sentences name it. */
export function placeText([lon = NaN, lat = NaN]: Position): string {
  const turned = lon - 360 * Math.round(lon / 360)
  const text = (degrees: number, [positive, negative]: [string, string]) => `${Math.abs(degrees).toFixed(3)} ${degrees < 0 ? negative : positive}`
  return `${text(lat, ['N', 'S'])}, ${text(turned, ['E', 'W'])}`
}
