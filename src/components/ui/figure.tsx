import type { ReactNode } from 'react'

interface Props {
  label: ReactNode
  /** Already formatted (src/lib/format); left out where the figure is missing. */
  value: string | undefined
  unit?: ReactNode
  note?: ReactNode
  ember?: boolean
}

/** One figure with its label above and its unit beside, smaller and in the text cut. */
export function Figure({ label, value, unit, note, ember = false }: Props) {
  return (
    <div className={ember ? 'text-ember' : ''}>
      <div className={`text-small ${ember ? '' : 'text-ink2'}`}>{label}</div>
      <div className="text-title">
        {value === undefined ? (
          <span className="text-body font-text text-ink2">not known</span>
        ) : (
          <>
            <span className="fig">{value}</span>
            {unit && <span className="ml-1 text-body font-text">{unit}</span>}
          </>
        )}
      </div>
      {note && <div className="text-fine text-ink2">{note}</div>}
    </div>
  )
}
