import { severities, severity as severitySchema } from '../../../shared/schemas/common'
import type { Region } from '../../../shared/schemas/regions'
import type { AlertFilter } from '../../api/alerts'
import { Choice } from '../../components/ui/choice'
import { SelectField } from '../../components/ui/field'

const states = [
  { value: 'all', label: 'all' },
  { value: 'open', label: 'open' },
  { value: 'acknowledged', label: 'acknowledged' },
  { value: 'closed', label: 'closed' },
] as const

interface Props {
  filter: AlertFilter
  regions: readonly Region[] | undefined
  onChange: (filter: AlertFilter) => void
  csv: string
}

export function Filters({ filter, regions, onChange, csv }: Props) {
  return (
    <div className="flex flex-wrap items-end gap-x-8 gap-y-4" data-no-print>
      <Choice
        label="State"
        options={states}
        value={filter.state ?? 'all'}
        onChange={(state) => onChange({ ...filter, state: state === 'all' ? undefined : state })}
      />
      <div className="grid w-full grid-cols-2 gap-4 tab:w-auto tab:grid-cols-[10rem_14rem]">
        <SelectField
          label="Severity"
          value={filter.severity ?? ''}
          onChange={(event) => onChange({ ...filter, severity: severitySchema.safeParse(event.target.value).data })}
        >
          <option value="">any</option>
          {severities.map((severity) => (
            <option key={severity}>{severity}</option>
          ))}
        </SelectField>
        <SelectField
          label="Region"
          value={filter.regionId ?? ''}
          onChange={(event) => onChange({ ...filter, regionId: event.target.value ? Number(event.target.value) : undefined })}
        >
          <option value="">any</option>
          {regions?.map((region) => (
            <option key={region.id} value={region.id}>
              {region.name}
            </option>
          ))}
        </SelectField>
      </div>
      <a className="link ml-auto inline-flex min-h-11 items-center font-strong tab:min-h-9" href={csv} download>
        CSV
      </a>
    </div>
  )
}
