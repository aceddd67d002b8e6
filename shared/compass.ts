const points = ['N', 'NNE', 'NE', 'ENE', 'E', 'ESE', 'SE', 'SSE', 'S', 'SSW', 'SW', 'WSW', 'W', 'WNW', 'NW', 'NNW']

/** The sixteenth of the compass a bearing (degrees from north) lies in. */
export function compassPoint(bearing: number): string {
  const turned = ((bearing % 360) + 360) % 360
  return points[Math.round(turned / 22.5) % 16]!
}
