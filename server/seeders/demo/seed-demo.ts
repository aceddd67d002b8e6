import { mkdir, readdir, rename, rm } from 'node:fs/promises'
import { join } from 'node:path'
import type { Person } from '../../accounts/person'
import { hashPassword } from '../../accounts/passwords'
import type { Context } from '../../context'
import { actOnAlert } from '../../desk/act-on-alert'
import { drawRegion } from '../../desk/draw-region'
import type { Ticker } from '../../jobs/ticker'
import { createFeed } from '../../pipeline/feeds'
import { refreshStandings } from '../../pipeline/refresh-standings'
import { setRoles } from '../../queries/people'
import { keepSetting } from '../../queries/settings'
import { newFeed } from '../../../shared/schemas/feeds'
import { newRegion } from '../../../shared/schemas/regions'
import { isoDay } from './days'
import { historyFiles, type DemoFile } from './files'
import { derivedFeeds } from './scenario-derived'
import { feeds, people, regions, scenarioDays, scenarioInstant, type DemoPerson } from './scenario'

const dayMs = 86_400_000
/** Business time at which a day's layers have arrived. */
const arrivalOfDay = (day: number) => day * dayMs + 16 * 3_600_000
const lastQuietDay = scenarioDays.today - 6

export function demoPassword(person: Pick<DemoPerson, 'roles'>): string {
  return `offing-demo-${person.roles[0]}`
}

/**
 * Plays the scenario up to its first "today": people, feeds and regions through the use cases, ten years as real files
 * through the inbox, the last days one by one with the clock standing at each.
 */
export async function seedDemo(context: Context, ticker: Ticker): Promise<void> {
  const { clock, db, env } = context
  clock.moveTo(arrivalOfDay(lastQuietDay))
  await db.write((tx) => keepSetting(db, tx, 'demo', 'half'))
  const persons = await addPeople(context)
  const admin = persons.get('admin@demo.example')!
  const analyst = persons.get('analyst@demo.example')!
  const feedIds = new Map<string, number>()
  for (const { key, ...feed } of feeds) feedIds.set(key, (await createFeed(context, admin, newFeed.parse(feed))).id)
  for (const { from, ...feed } of derivedFeeds) await createFeed(context, analyst, newFeed.parse({ ...feed, derivedFrom: feedIds.get(from) }))
  for (const { key: _, feed, ...region } of regions) await drawRegion(context, analyst, newRegion.parse({ ...region, feedId: feedIds.get(feed) }))

  const staging = join(env.dataDir, 'demo-staging')
  await mkdir(staging, { recursive: true })
  const files = historyFiles()
  const isLate = (file: DemoFile) => file.days.length === 1 && file.days[0]! > lastQuietDay
  console.log(`Making ${files.length} demo files: ten years of layers, every value invented ...`)
  await writeAll(context, files, staging)
  console.log('Reading them ...')
  await deliver(context, ticker, staging, files.filter((file) => !isLate(file)))
  for (let day = lastQuietDay + 1; day < scenarioDays.today; day++) {
    clock.moveTo(arrivalOfDay(day))
    await deliver(context, ticker, staging, files.filter((file) => isLate(file) && file.days[0] === day))
    if (isoDay(day) === '2026-06-07') await acknowledgeFirst(context, persons.get('dara.quell@demo.example')!)
  }
  await rm(staging, { recursive: true, force: true })
  clock.moveTo(scenarioInstant)
  // Whatever was judged on an earlier day stands as of today, as the ticker would see to within minutes.
  await refreshStandings(context)
  await ticker.drain()
  await db.write(async (tx) => {
    await keepSetting(db, tx, 'clock-offset', String(clock.offset()))
    await keepSetting(db, tx, 'demo-last-day', String(scenarioDays.today - 1))
    await keepSetting(db, tx, 'demo', 'whole')
  })
}

async function addPeople(context: Context): Promise<Map<string, Person>> {
  const persons = new Map<string, Person>()
  for (const person of people) {
    const passwordHash = await hashPassword(context, demoPassword(person))
    const id = await context.db.write(async (tx) => {
      const { name, email, roles } = person
      const user = await context.models.users.create(
        { name, email, passwordHash, timeZone: 'Europe/Dublin', disabled: false, createdAt: context.clock.now() },
        { transaction: tx },
      )
      await setRoles(context.db, user.id, roles, tx)
      const minimumSeverity = roles.includes('officer') ? ('Minor' as const) : roles.includes('analyst') ? ('Moderate' as const) : null
      if (minimumSeverity) await context.models.subscriptions.create({ userId: user.id, allRegions: true, minimumSeverity, delivery: 'at once' }, { transaction: tx })
      return user.id
    })
    persons.set(person.email, { id, email: person.email, name: person.name, roles: person.roles, timeZone: 'Europe/Dublin', by: { sessionId: 0 } })
  }
  return persons
}

/** Two threads make the files side by side. */
async function writeAll(context: Context, files: readonly DemoFile[], directory: string): Promise<void> {
  const left = [...files].reverse()
  const hand = async (pool: 'light' | 'heavy') => {
    for (let file = left.pop(); file; file = left.pop()) await context.workers[pool]('writeDemoFile', { file, directory })
  }
  await Promise.all([hand('light'), hand('heavy')])
}

/** Files appear in the watched folder as they would from anywhere, and are read to the end. */
async function deliver(context: Context, ticker: Ticker, staging: string, files: readonly DemoFile[]): Promise<void> {
  const inbox = join(context.env.dataDir, 'inbox')
  for (const file of files) await rename(join(staging, file.name), join(inbox, file.name))
  do await ticker.drain()
  while ((await readdir(inbox)).length > 0)
  await ticker.drain()
}

async function acknowledgeFirst(context: Context, person: Person): Promise<void> {
  const alert = await context.models.alerts.findOne({ where: { state: 'open' }, order: [['id', 'ASC']] })
  if (!alert) return
  await actOnAlert(context, {
    alertId: alert.id,
    person,
    kind: 'acknowledged',
    text: 'Called the growers (demo): gear looks normal, a water sample goes to the laboratory on Thursday.',
    change: (_, now) => ({ state: 'acknowledged', acknowledgedBy: person.id, acknowledgedAt: now, assigneeId: person.id }),
  })
}
