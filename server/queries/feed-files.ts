import type { ReportVariable } from '../../shared/schemas/files'
import type { Context } from '../context'
import type { Transaction } from '../db'

/** The variables of the newest file a feed took a layer from; before the first, of the newest file that holds its variable. */
export async function newestReport(context: Context, tx: Transaction, feed: { id: number; variable: string }): Promise<ReportVariable[] | null> {
  const taken = await context.db.first<{ variables: string | null }>(
    `SELECT f.report ->> '$.variables' AS variables FROM layers l JOIN files f ON f.id = l.file_id WHERE l.feed_id = $id ORDER BY l.observed_at DESC LIMIT 1`,
    { id: feed.id },
    tx,
  )
  const found =
    taken ??
    (await context.db.first<{ variables: string | null }>(
      `SELECT f.report ->> '$.variables' AS variables FROM files f WHERE f.report IS NOT NULL
       AND EXISTS (SELECT 1 FROM json_each(f.report, '$.variables') v WHERE v.value ->> 'name' = $variable) ORDER BY f.id DESC LIMIT 1`,
      { variable: feed.variable },
      tx,
    ))
  return found?.variables ? (JSON.parse(found.variables) as ReportVariable[]) : null
}
