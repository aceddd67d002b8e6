import { epochDay } from './days'
import type { Role } from '../../../shared/permissions'

export { feeds, longFeedVersions, reflectanceBands } from './scenario-feeds'
export type { ChlorophyllFeedKey, DemoFeed, FeedKey, ReflectanceBand } from './scenario-feeds'
export { regionOf, regions } from './scenario-regions'
export type { DemoRegion, RegionKey } from './scenario-regions'

/** Everything is invented: people, organisation, places, and every value of the sea. */
export const seed = 20260611

export const cooperative = 'Hollin Ledge Growers Co-operative (demo)'

/** The business clock of the demo stands here at its first start. */
export const scenarioInstant = Date.parse('2026-06-11T15:20:00Z')

export const scenarioDays = {
  /** First day of the ten years. */
  first: epochDay('2016-06-11'),
  /** The first day not in the history: its layers arrive while somebody watches. */
  today: epochDay('2026-06-11'),
  /** First day of the two feeds with six years. */
  firstOfSecondFeeds: epochDay('2020-06-11'),
  /** Last layer of the second sensor before it fell silent. */
  lastOfSecond: epochDay('2026-06-02'),
  /** First day the long record came in its new processing version. */
  longFeedChange: epochDay('2026-05-20'),
  firstOfReflectance: epochDay('2024-06-11'),
}

export interface DemoPerson {
  name: string
  email: string
  roles: Role[]
  /** One of the four whose sign-in is printed at the start. */
  printed: boolean
}

export const people: DemoPerson[] = [
  { name: 'Ottoline Brask', email: 'analyst@demo.example', roles: ['analyst'], printed: true },
  { name: 'Ines Marrow', email: 'officer@demo.example', roles: ['officer'], printed: true },
  { name: 'Halvard Pike', email: 'researcher@demo.example', roles: ['researcher'], printed: true },
  { name: 'Tobias Fenn', email: 'admin@demo.example', roles: ['admin'], printed: true },
  { name: 'Dara Quell', email: 'dara.quell@demo.example', roles: ['officer', 'analyst'], printed: false },
  { name: 'Perpetua Lunn', email: 'perpetua.lunn@demo.example', roles: ['researcher'], printed: false },
]
