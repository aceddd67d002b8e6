import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { ImportedArea } from '../../../shared/schemas/outlines'
import { FaultMark } from '../../components/ui/fault-mark'
import { TextField } from '../../components/ui/field'
import { grouped, threeDigits } from '../../lib/format'

export interface AreaState {
  name: string
  ticked: boolean
  regionId: number | null
  problem: string | undefined
}

interface Props {
  place: number
  item: ImportedArea
  state: AreaState
  onChange: (fields: Partial<AreaState>) => void
}

/** One area of the file: ticked and named, or refused with its sentence, or saved. */
export function AreaItem({ place, item, state, onChange }: Props) {
  const { found, refusal } = item
  if (!found) {
    return (
      <li className="border-b border-rule py-3">
        <span className="font-strong">
          <span className="fig mr-2 text-ink2">{place + 1}</span>
          {item.name}
        </span>
        <p className="mt-1 flex items-start gap-2 text-small">
          <FaultMark /> {refusal?.sentence}
        </p>
      </li>
    )
  }
  if (state.regionId !== null) {
    return (
      <li className="border-b border-rule py-3">
        <span className="fig mr-2 text-ink2">{place + 1}</span>
        <Link className="link font-strong" to={paths.region.to({ id: state.regionId })}>
          {state.name}
        </Link>{' '}
        <span className="text-ink2">saved</span>
      </li>
    )
  }
  const area = found.areaKm2 < 1000 ? threeDigits(found.areaKm2) : grouped(Math.round(found.areaKm2))
  return (
    <li className="grid grid-cols-[auto_minmax(0,1fr)] gap-x-3 border-b border-rule py-3">
      <label className="flex min-h-11 min-w-11 items-center justify-center gap-2 self-start tab:min-h-9 tab:min-w-9">
        <input type="checkbox" className="size-4.5 accent-accent" checked={state.ticked} aria-label={`Save ${state.name || `area ${place + 1}`}`} onChange={(event) => onChange({ ticked: event.target.checked })} />
      </label>
      <div className="grid gap-1">
        <TextField label={`Name of area ${place + 1}`} value={state.name} maxLength={100} error={state.problem} disabled={!state.ticked} onChange={(event) => onChange({ name: event.target.value, problem: undefined })} />
        <p className="text-small text-ink2">
          <span className="fig">{area}</span> km²{found.repairs.length > 0 && `. Put right: ${found.repairs.join(' ')}`}
        </p>
      </div>
    </li>
  )
}
