import type { ComponentProps } from 'react'
import { TextField } from '../ui/field'

const zones = Intl.supportedValuesOf('timeZone')

/** Clock times of this water are told in this zone. Spread `register` onto it. */
export function TimeZoneField({ label = 'Time zone', ...rest }: Omit<ComponentProps<typeof TextField>, 'label'> & { label?: string }) {
  return (
    <>
      <TextField label={label} list="time-zones" autoComplete="off" spellCheck={false} {...rest} />
      <datalist id="time-zones">
        {zones.map((zone) => (
          <option key={zone} value={zone} />
        ))}
      </datalist>
    </>
  )
}
