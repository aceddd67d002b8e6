import { ApiError } from '../api-error'

const mostZoom = 16

/** Where a tile lies, from its address; says what is wrong with one that lies nowhere. */
export function tilePlace(address: { z: string; x: string; y: string }): { z: number; x: number; y: number } {
  if (![address.z, address.x, address.y].every((part) => /^\d{1,9}$/.test(part))) {
    throw new ApiError('bad-request', 'The address of a tile is zoom/column/row.png in whole numbers from 0, such as 5/15/10.png.')
  }
  const [z, x, y] = [Number(address.z), Number(address.x), Number(address.y)]
  if (z > mostZoom) throw new ApiError('not-found', `There are no tiles at zoom ${z}: they go from 0 to ${mostZoom}.`)
  const across = 2 ** z
  if (x >= across || y >= across) throw new ApiError('not-found', `There is no tile ${x}/${y} at zoom ${z}: columns and rows go from 0 to ${across - 1}.`)
  return { z, x, y }
}
