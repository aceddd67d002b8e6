import { paths } from '../../../shared/paths'
import type { Action } from '../../../shared/permissions'

interface Room {
  name: string
  to: string
  may?: Action
}

export const rooms: readonly Room[] = [
  { name: 'Today', to: paths.today.to() },
  { name: 'Alerts', to: paths.alerts.to() },
  { name: 'Regions', to: paths.regions.to() },
  { name: 'Layers', to: paths.layers.to() },
  { name: 'Feeds', to: paths.feeds.to() },
]

/** Running the place: one word in the masthead, for those who may. */
export const runningRooms: readonly (Room & { may: Action })[] = [
  { name: 'People', to: paths.people.to(), may: 'people:edit' },
  { name: 'Subscriptions', to: paths.subscriptions.to(), may: 'subscription:any' },
  { name: 'Jobs', to: paths.jobs.to(), may: 'job:any' },
  { name: 'Letters', to: paths.letters.to(), may: 'letter:any' },
  { name: 'Audit', to: paths.audit.to(), may: 'audit:read' },
]
