/** The hatch of missing, as a canvas pattern: the same angle as everywhere else. */
export function hatchPattern(context: CanvasRenderingContext2D, ground: string, stroke: string, pixelRatio: number) {
  const size = Math.round(5 * pixelRatio)
  const tile = document.createElement('canvas')
  tile.width = size
  tile.height = size * 2
  const pen = tile.getContext('2d')
  if (!pen) return ground
  pen.fillStyle = ground
  pen.fillRect(0, 0, size, size * 2)
  pen.strokeStyle = stroke
  pen.lineWidth = pixelRatio
  pen.beginPath()
  for (const shift of [-size, 0, size]) {
    pen.moveTo(shift, size * 2)
    pen.lineTo(shift + size, 0)
  }
  pen.stroke()
  return context.createPattern(tile, 'repeat') ?? ground
}
