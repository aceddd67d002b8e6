import type { Context } from '../context'
import { sweepDecoded } from '../pipeline/sweep-decoded'
import { removeDoneJobs, removeOldAddresses } from '../queries/old-rows'
import { keepSetting, settingOf } from '../queries/settings'

const dayMs = 86_400_000
const keptDaysOfJobs = 30
const spareDaysOfAddresses = 60
const lastTidied = 'tidied-at'

/** Once a day takes away rows and decoded tiles that nobody needs any more. When it did so last is kept, so a restart does not put it off. */
export async function tidy(context: Context): Promise<void> {
  const now = context.clock.now()
  const last = Number((await settingOf(context.db, lastTidied)) ?? -Infinity)
  // A clock that was set back, as the demo's may be, must not stop it for good.
  if (last <= now && now - last < dayMs) return
  await context.db.write(async (tx) => {
    await removeDoneJobs(context.db, tx, now - keptDaysOfJobs * dayMs)
    await removeOldAddresses(context.db, tx, { now, spareDays: spareDaysOfAddresses })
    await keepSetting(context.db, tx, lastTidied, String(now))
  })
  await sweepDecoded(context)
}
