import { foldEvents } from '../../shared/science/events'
import { judgeSeries, type Judgement } from '../../shared/science/judge'
import { isUsable } from '../../shared/science/judge-view'
import type { JudgeRegionInput, RegionJudgement } from './tasks'

/**
 * Judges a region's whole series. Values of one processing version are compared with that version's own earlier years
 * only; a date that has a baseline in another version, but none in its own, is not comparable.
 */
export function judgeRegion({ views, ...input }: JudgeRegionInput): RegionJudgement {
  const versions = [...new Set(views.map((view) => view.processingVersion))]
  const own = new Map<string, Judgement>(
    versions.map((version) => [
      version,
      judgeSeries({ ...input, views: views.filter((view) => view.processingVersion === version) }),
    ]),
  )
  const anyVersion = versions.length > 1 ? judgeSeries({ ...input, views }) : null
  const readyInAny = new Set(anyVersion?.judged.filter((view) => view.state !== 'not-ready').map((view) => view.day))
  const judged = [...own.values()]
    .flatMap((judgement) => judgement.judged)
    .map((view) => (view.state === 'not-ready' && readyInAny.has(view.day) ? { ...view, state: 'not-comparable' as const } : view))
    .sort((a, b) => a.day - b.day)
  const comparable = judged.flatMap((view) => (view.state === 'not-comparable' ? [] : [{ ...view, state: view.state }]))
  const newest = views.filter((view) => isUsable(view, input.rule)).reduce<(typeof views)[number] | null>((a, b) => (a && a.day > b.day ? a : b), null)
  const processingVersion = newest?.processingVersion ?? versions[0] ?? null
  return {
    judged,
    events: foldEvents(comparable, input.rule, input.today),
    baseline: (processingVersion !== null ? own.get(processingVersion)?.baseline : null) ?? null,
    processingVersion,
  }
}

