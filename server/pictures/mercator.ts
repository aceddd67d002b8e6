/** Web Mercator tiles: 256 pixels a side, 2^z tiles round the globe. */
export const tileSize = 256

export function longitudeOf(z: number, pixelX: number): number {
  return (pixelX / (tileSize * 2 ** z)) * 360 - 180
}

export function latitudeOf(z: number, pixelY: number): number {
  const n = Math.PI * (1 - (2 * pixelY) / (tileSize * 2 ** z))
  return (Math.atan(Math.sinh(n)) * 180) / Math.PI
}
