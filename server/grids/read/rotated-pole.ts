/**
 * From a rotated grid's longitude and latitude to the true ones, in degrees. The rotated north pole stands at
 * (poleLon, poleLat); poleGridLon is the rotated longitude of the true pole. Source: CF conventions, appendix F.
 */
export function rotatedToTrue(
  { poleLat, poleLon, poleGridLon }: { poleLat: number; poleLon: number; poleGridLon: number },
): (lon: number, lat: number) => [lon: number, lat: number] {
  const radians = Math.PI / 180
  const [sinPole, cosPole] = [Math.sin(poleLat * radians), Math.cos(poleLat * radians)]
  return (lon, lat) => {
    const [east, up] = [(lon - poleGridLon) * radians, lat * radians]
    const x = Math.cos(up) * Math.cos(east)
    const y = Math.cos(up) * Math.sin(east)
    const z = Math.sin(up)
    // Seen from the rotated pole the true pole lies towards rotated longitude 0; turned upright it is the z axis.
    const upright = sinPole * x + cosPole * -z
    const trueLat = Math.asin(Math.max(-1, Math.min(1, cosPole * x + sinPole * z)))
    const trueLon = poleLon + 180 + Math.atan2(y, upright) / radians
    return [trueLon - 360 * Math.floor((trueLon + 180) / 360), trueLat / radians]
  }
}
