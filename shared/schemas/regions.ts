import { z } from 'zod'
import { day, id, instant, regionState, severity, timeZone, version } from './common'

const position = z.array(z.number()).min(2).max(4)
const ring = z.array(position).min(4).max(20_000)
export const polygon = z.object({ type: z.literal('Polygon'), coordinates: z.array(ring).min(1) })
export const multiPolygon = z.object({ type: z.literal('MultiPolygon'), coordinates: z.array(z.array(ring).min(1)).min(1) })
/** GeoJSON (RFC 7946), longitude first. Taken loosely here; what is wrong with it is said by the use case. */
export const regionGeometry = z.discriminatedUnion('type', [polygon, multiPolygon])
export type RegionGeometry = z.infer<typeof regionGeometry>

export const site = z.object({
  name: z.string().trim().max(100),
  latitude: z.number().min(-90).max(90),
  longitude: z.number().min(-180).max(180),
})
export const contact = z.object({
  name: z.string().trim().min(1).max(100),
  phone: z.string().trim().max(40).nullable().default(null),
  note: z.string().trim().max(300).nullable().default(null),
})

const regionSettings = {
  name: z.string().trim().min(1, 'A region needs a name.').max(100),
  timeZone,
  site: site.nullable(),
  contacts: z.array(contact).max(30),
  shoreBufferKm: z.number().min(0).max(50),
  opticallyComplex: z.boolean(),
}

/** A lake or narrow inlet that the bundled coastline does not know: an outline with no water in it is kept. */
const inland = z.boolean().default(false)

export const newRegion = z.object({
  name: regionSettings.name,
  geometry: z.unknown(),
  inland: inland,
  timeZone: regionSettings.timeZone.default('UTC'),
  site: regionSettings.site.default(null),
  contacts: regionSettings.contacts.default([]),
  shoreBufferKm: regionSettings.shoreBufferKm.default(0),
  opticallyComplex: regionSettings.opticallyComplex.default(false),
  /** The feed its first rule watches; left out, the first chlorophyll feed that covers it. */
  feedId: id.optional(),
})

export const regionChange = z.object({
  version,
  name: regionSettings.name.optional(),
  geometry: z.unknown().optional(),
  /** Redraw although an event is running: it ends with that reason. */
  confirm: z.boolean().default(false),
  inland: inland,
  timeZone: regionSettings.timeZone.optional(),
  site: regionSettings.site.optional(),
  contacts: regionSettings.contacts.optional(),
  shoreBufferKm: regionSettings.shoreBufferKm.optional(),
  opticallyComplex: regionSettings.opticallyComplex.optional(),
})

/** A view as a state, a list row or a "why" shows it. */
export const shownView = z.object({
  layerId: id,
  day,
  observedAt: instant,
  ageHours: z.number(),
  coverage: z.number(),
  value: z.number().nullable(),
  usual: z.number().nullable(),
  p10: z.number().nullable(),
  p90: z.number().nullable(),
  timesUsual: z.number().nullable(),
})
export type ShownView = z.infer<typeof shownView>

/** A reading that is neither under way nor done says so until somebody goes on with it. */
export const historyStates = ['waiting', 'running', 'paused', 'cancelled', 'failed'] as const
export type HistoryState = (typeof historyStates)[number]

export const historyActs = ['pause', 'go-on', 'stop'] as const
export type HistoryAct = (typeof historyActs)[number]
export const historySteering = z.object({ act: z.enum(historyActs) })

export const regionStanding = z.object({
  state: regionState,
  /** Why it is in that state, in one sentence. */
  because: z.string(),
  feedId: id.nullable(),
  ruleId: id.nullable(),
  unit: z.string().nullable(),
  severity: severity.nullable(),
  alertId: id.nullable(),
  /** The newest usable view, however old. */
  view: shownView.nullable(),
  /** The last 14 days, oldest first: share of the water seen, null where no layer came. */
  seen: z.array(z.object({ day, coverage: z.number().nullable() })),
  coverageFloor: z.number(),
  /** How much of the region's history has been read, until all of it is. */
  progress: z.object({ state: z.enum(historyStates), done: z.number().int(), total: z.number().int() }).nullable(),
})
export type RegionStanding = z.infer<typeof regionStanding>

export const region = z.object({
  id,
  ...regionSettings,
  geometry: regionGeometry,
  geometryVersion: z.number().int(),
  areaKm2: z.number(),
  createdAt: instant,
  createdBy: z.string().nullable(),
  retired: z.boolean(),
  version,
  standing: regionStanding,
  /** What was put right in the outline as it was sent (winding, repeated points, altitudes). */
  repairs: z.array(z.string()),
})
export type Region = z.infer<typeof region>

export const featureCollection = z.object({
  type: z.literal('FeatureCollection'),
  features: z.array(
    z.object({
      type: z.literal('Feature'),
      id: id.optional(),
      geometry: regionGeometry,
      properties: z.record(z.string(), z.unknown()),
    }),
  ),
})
