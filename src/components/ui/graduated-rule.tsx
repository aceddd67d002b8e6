interface Props {
  /** Width of one segment; the last is cut where the rule ends. */
  segmentPx?: number
  thickness?: number
  className?: string
}

/** The edge of a sea chart: alternating ink and paper in a thin frame. One segment is one unit. */
export function GraduatedRule({ segmentPx = 24, thickness = 5, className = '' }: Props) {
  return (
    <div
      aria-hidden
      className={`border border-(--segment) ${className}`}
      style={{
        height: thickness,
        backgroundImage: `repeating-linear-gradient(90deg, var(--segment) 0 ${segmentPx}px, var(--paper) ${segmentPx}px ${segmentPx * 2}px)`,
      }}
    />
  )
}
