/** Ring, half-filled ring, disc, double disc, made of boxes: the same shapes as on screen. */
export function severityMarks(colour: string): Record<string, string> {
  const shape = (style: string) =>
    `<span style="display:inline-block;box-sizing:border-box;width:13px;height:13px;border-radius:50%;vertical-align:-1px;${style}"></span>`
  const gap = '<span style="display:inline-block;width:7px"></span>'
  const disc = shape(`background:${colour}`)
  return {
    Minor: shape(`border:2px solid ${colour}`) + gap,
    Moderate: shape(`border:2px solid ${colour};background:linear-gradient(transparent 50%,${colour} 50%)`) + gap,
    Severe: disc + gap,
    Extreme: disc + shape(`width:15px;height:15px;margin-left:-6px;vertical-align:-2px;background:${colour};border:1px solid #fdfbf6`) + gap,
  }
}
