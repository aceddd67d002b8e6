import { figureText } from '../../shared/figure-text'
import { epochDayOf } from '../../shared/science/local-day'
import type { Evidence, Explanation } from '../../shared/schemas/alerts'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { AlertRecord } from '../models/alert'
import { judgeableViews } from '../queries/judgeable-views'
import { freshFigures } from '../pipeline/summarise-views'

const tolerance = 1e-6

/** Computes an alert's evidence again: the view from the stored layers, what is usual from the summaries. */
export async function explainAlert(context: Context, alert: AlertRecord): Promise<Explanation> {
  const { models } = context
  const stored = alert.evidence
  const day = epochDayOf(stored.day)
  const geometry = await models.geometries.findOne({ where: { regionId: alert.regionId, version: stored.geometryVersion } })
  const version = await models.ruleVersions.findOne({ where: { ruleId: alert.ruleId, version: stored.ruleVersion } })
  if (!geometry || !version) throw new ApiError('not-found', 'The outline or the rule this alert rests on is gone.')
  const rule = version.definition
  const views = (await judgeableViews(context, geometry.id, alert.feedId)).filter((view) => view.day <= day)
  const again = await freshFigures(context, { geometryId: geometry.id, feedId: alert.feedId, day }, stored.waterMask)
  const replaced = views.map((view) =>
    view.day === day && again
      ? { ...view, coverage: again.coverage, wholeValid: again.wholeValid, statistics: { median: again.median, geometricMean: again.geometricMean, mean: again.mean, p90: again.p90 } }
      : view,
  )
  const judgement = await context.workers.light('judgeRegion', { views: replaced, rule, today: day })
  const verdict = judgement.judged.find((view) => view.day === day) ?? null
  const recomputed = {
    value: verdict?.value ?? null,
    usual: verdict?.usual ?? null,
    p10: verdict?.p10 ?? null,
    p90: verdict?.p90 ?? null,
    threshold: verdict?.threshold ?? null,
    timesUsual: verdict?.timesUsual ?? null,
    coverage: again?.coverage ?? null,
    checksum: again?.checksum ?? null,
  }
  const differences = differencesOf(stored, recomputed)
  const agrees = differences.length === 0
  const sentence = agrees ? 'Recomputed from the stored layers: agrees.' : 'Recomputed from the stored layers: does not agree.'
  return { agrees, sentence, stored, recomputed, differences }
}

function differencesOf(stored: Evidence, recomputed: Explanation['recomputed']): string[] {
  const figures = ['value', 'usual', 'p10', 'p90', 'threshold', 'timesUsual', 'coverage'] as const
  const names = { value: 'value', usual: 'usual', p10: 'p10', p90: 'p90', threshold: 'threshold', timesUsual: 'times usual', coverage: 'coverage' }
  const differences = figures.flatMap((name) => {
    const [then, now] = [stored[name], recomputed[name]]
    if (then === null && now === null) return []
    const same = then !== null && now !== null && Math.abs(then - now) <= tolerance * Math.max(Math.abs(then), Math.abs(now))
    const words = (value: number | null) => (value === null ? 'missing' : figureText(value))
    return same ? [] : [`${names[name]} was ${words(then)}, is ${words(now)}`]
  })
  if (recomputed.checksum !== stored.checksum) differences.push('the layer is another file now')
  return differences
}
