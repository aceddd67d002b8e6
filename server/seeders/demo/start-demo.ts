import { dateOf } from '../../../shared/science/local-day'
import { settingOf } from '../../queries/settings'
import { CannotStart, type Serving } from '../../serve-offing'
import { deliverNewDays } from './deliver-new-days'
import { people } from './scenario'
import { demoPassword, seedDemo } from './seed-demo'

const firstDeliveryMs = 20_000
const lookEveryMs = 10_000

/** Seeds the scenario at the first start, then answers, prints how to get in, and delivers each new day's layers. */
export async function startDemo({ context, ticker, listen }: Serving): Promise<void> {
  const marked = await settingOf(context.db, 'demo')
  const someone = await context.models.users.count()
  if (marked === null && someone > 0) {
    throw new CannotStart(`${context.env.dataDir} holds an Offing that is no demo. Set DATA_DIR to another folder for the demo.`)
  }
  if (marked === 'half') throw new CannotStart(`The demo in ${context.env.dataDir} was cut off while it was made. Delete that folder and start again.`)
  const began = context.clock.system()
  if (marked === null) await seedDemo(context, ticker)
  await listen()
  const seconds = Math.round((context.clock.system() - began) / 1000)
  console.log(welcome(context.env.baseUrl, dateOf(Math.floor(context.clock.now() / 86_400_000)), marked === null ? seconds : null))
  const look = () =>
    void deliverNewDays(context).catch((error: unknown) => context.log.error({ err: error }, 'the demo could not deliver a day'))
  setTimeout(() => {
    look()
    setInterval(look, lookEveryMs).unref()
  }, firstDeliveryMs).unref()
}

function welcome(baseUrl: string, today: string, seconds: number | null): string {
  const printed = people.filter((person) => person.printed)
  const width = Math.max(...printed.map((person) => person.email.length))
  return [
    '',
    `Offing demo: ${baseUrl}${seconds === null ? '' : `   (ready after ${seconds} s)`}`,
    `Its calendar stands at ${today}. People, places and figures are invented. A new layer arrives in about 20 seconds.`,
    '',
    ...printed.map((person) => `  ${person.roles[0]!.padEnd(11)} ${person.email.padEnd(width)}  ${demoPassword(person)}`),
    '',
    `Letters are caught here: ${baseUrl}/mail`,
    '',
  ].join('\n')
}
