import { z } from 'zod'
import { timeZone } from '../../../shared/schemas/common'
import type { contact} from '../../../shared/schemas/regions';
import { type Region } from '../../../shared/schemas/regions'
import { parsePosition } from '../outline/parse-position'

/** What the form holds, as typed. */
export const regionFields = z.object({
  name: z.string().trim().min(1, 'A region needs a name: it stands on the map and in letters.').max(100, 'At most 100 characters.'),
  timeZone,
  siteName: z.string().trim().max(100, 'At most 100 characters.'),
  sitePosition: z
    .string()
    .trim()
    .refine((text) => text === '' || parsePosition(text) !== undefined, 'Write it like 51.95, -10.70 or 51 57.0 N, 10 42.0 W.'),
  contacts: z.array(
    z.object({
      name: z.string().trim().min(1, 'A contact needs a name.').max(100, 'At most 100 characters.'),
      phone: z.string().trim().max(40, 'At most 40 characters.'),
      note: z.string().trim().max(300, 'At most 300 characters.'),
    }),
  ),
  feedId: z.string(),
  shoreBufferKm: z
    .string()
    .trim()
    .refine((text) => bufferOf(text) !== undefined, 'Between 0 and 50 km.'),
  inland: z.boolean(),
})
export type RegionFields = z.infer<typeof regionFields>

export function blankFields(): RegionFields {
  return { name: '', timeZone: Intl.DateTimeFormat().resolvedOptions().timeZone, siteName: '', sitePosition: '', contacts: [], feedId: '', shoreBufferKm: '0', inland: false }
}

export function fieldsOf({ name, timeZone, site, contacts, shoreBufferKm }: Region): RegionFields {
  return {
    name,
    timeZone,
    siteName: site?.name ?? '',
    sitePosition: site ? positionText(site) : '',
    contacts: contacts.map((one) => ({ name: one.name, phone: one.phone ?? '', note: one.note ?? '' })),
    feedId: '',
    shoreBufferKm: String(shoreBufferKm),
    inland: false,
  }
}

/** Kilometres as typed; undefined where that is no distance the server takes. */
export function bufferOf(text: string): number | undefined {
  const km = text === '' ? 0 : Number(text.replace(',', '.'))
  return Number.isFinite(km) && km >= 0 && km <= 50 ? km : undefined
}

export function positionText({ latitude, longitude }: { latitude: number; longitude: number }): string {
  return `${latitude.toFixed(4)}, ${longitude.toFixed(4)}`
}

/** The site as the server takes it: longitudes of a map turned round more than once come back within 180. */
export function siteOf({ siteName, sitePosition }: RegionFields) {
  const position = parsePosition(sitePosition)
  if (!position) return null
  const longitude = ((((position.longitude + 180) % 360) + 360) % 360) - 180
  return { name: siteName, latitude: position.latitude, longitude }
}

export function contactsOf(fields: RegionFields): z.input<typeof contact>[] {
  return fields.contacts.map((one) => ({ name: one.name, phone: one.phone || null, note: one.note || null }))
}
