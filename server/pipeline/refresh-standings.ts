import type { Context } from '../context'
import { enqueueJob } from '../jobs/queue'

/** As days pass without a view, events are lost from view: rules judged on an earlier day are judged again. */
export async function refreshStandings(context: Context): Promise<void> {
  const startOfDay = Math.floor(context.clock.now() / 86_400_000) * 86_400_000
  await context.db.write(async (tx) => {
    const old = await context.db.all<{ ruleId: number; name: string }>(
      `SELECT s.rule_id AS ruleId, re.name FROM standings s JOIN rules ru ON ru.id = s.rule_id JOIN regions re ON re.id = ru.region_id
       WHERE s.judged_at < $startOfDay AND ru.active_version IS NOT NULL AND re.retired_at IS NULL`,
      { startOfDay },
      tx,
    )
    for (const { ruleId, name } of old) {
      await enqueueJob(context, tx, { kind: 'judge-region', key: String(ruleId), subject: name, payload: { ruleId }, priority: 50 })
    }
  })
}
