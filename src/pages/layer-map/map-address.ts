import { paths } from '../../../shared/paths'

export interface Place {
  latitude: number
  longitude: number
}

/** All that the page shows, as kept by its address. */
export interface MapAddress {
  feedId?: number | undefined
  day?: string | undefined
  /** One of several layers of the day. */
  layerId?: number | undefined
  /** The place whose cell is read. */
  at?: Place | undefined
}

export function readAddress(search: URLSearchParams): MapAddress {
  const day = search.get('day')
  return { feedId: wholeNumber(search.get('feed')), day: day && isDay(day) ? day : undefined, layerId: wholeNumber(search.get('layer')), at: placeOf(search.get('at')) }
}

export function addressParams({ feedId, day, layerId, at }: MapAddress): Record<string, string> {
  return {
    ...(feedId === undefined ? {} : { feed: String(feedId) }),
    ...(day === undefined ? {} : { day }),
    ...(layerId === undefined ? {} : { layer: String(layerId) }),
    ...(at === undefined ? {} : { at: `${at.latitude},${at.longitude}` }),
  }
}

/** A link to the map of a feed's layers on a day. */
export function mapLink(address: MapAddress): string {
  return `${paths.layerMap.to()}?${new URLSearchParams(addressParams(address))}`
}

function wholeNumber(text: string | null): number | undefined {
  return text !== null && /^[1-9]\d{0,14}$/.test(text) ? Number(text) : undefined
}

function isDay(text: string): boolean {
  return /^\d{4}-\d{2}-\d{2}$/.test(text) && new Date(`${text}T00:00Z`).toJSON()?.slice(0, 10) === text
}

function placeOf(text: string | null): Place | undefined {
  const [latitude, longitude, ...rest] = (text ?? '').split(',').map((part) => (part.trim() === '' ? NaN : Number(part)))
  if (latitude === undefined || longitude === undefined || rest.length > 0) return undefined
  return Math.abs(latitude) <= 90 && Math.abs(longitude) <= 540 ? { latitude, longitude } : undefined
}
