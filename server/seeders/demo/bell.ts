/** 1 at `middle`, falling off as a normal curve with its own width on each side. */
export function bell(value: number, middle: number, widthBefore: number, widthAfter: number): number {
  const away = (value - middle) / (value < middle ? widthBefore : widthAfter)
  return Math.exp(-0.5 * away * away)
}
