import { isUsable } from '../../shared/science/judge-view'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { StoredView } from '../queries/judgeable-views'
import type { RegionJudgement } from '../workers/tasks'
import type { Subject } from './active-rule'
import type { KeptEvent } from './keep-events'

export interface Judged {
  views: readonly StoredView[]
  judgement: RegionJudgement
  events: readonly KeptEvent[]
  baselineId: number | null
}

/** Keeps where a region stands by one rule: its newest usable view and whether an event is running. */
export async function keepStanding(context: Context, tx: Transaction, { rule, geometry, definition }: Subject, judged: Judged): Promise<void> {
  const verdicts = new Map(judged.judgement.judged.map((one) => [one.day, one]))
  // A view dated after today is not judged yet, so a region can't stand on it.
  const view = judged.views.findLast((one) => verdicts.has(one.day) && isUsable(one, definition))
  const verdict = view && verdicts.get(view.day)
  const running = judged.events.find((event) => event.phase === 'running')
  await context.db.run(
    `INSERT INTO standings (rule_id, geometry_id, baseline_id, judged_at, state, in_event, severity, day, layer_id, observed_at, coverage,
       value, usual, p10, p90, threshold, times_usual)
     VALUES ($ruleId, $geometryId, $baselineId, $at, $state, $inEvent, $severity, $day, $layerId, $observedAt, $coverage,
       $value, $usual, $p10, $p90, $threshold, $timesUsual)
     ON CONFLICT (rule_id) DO UPDATE SET geometry_id = excluded.geometry_id, baseline_id = excluded.baseline_id, judged_at = excluded.judged_at,
       state = excluded.state, in_event = excluded.in_event, severity = excluded.severity, day = excluded.day, layer_id = excluded.layer_id,
       observed_at = excluded.observed_at, coverage = excluded.coverage, value = excluded.value, usual = excluded.usual, p10 = excluded.p10,
       p90 = excluded.p90, threshold = excluded.threshold, times_usual = excluded.times_usual`,
    {
      ruleId: rule.id,
      geometryId: geometry.id,
      baselineId: judged.baselineId,
      at: context.clock.now(),
      state: verdict?.state === 'not-seen' || !verdict ? 'never-seen' : verdict.state,
      inEvent: running ? 1 : 0,
      severity: running?.severity ?? null,
      day: view?.day ?? null,
      layerId: view?.layerId ?? null,
      observedAt: view ? (view.endsAt ?? view.observedAt) : null,
      coverage: view?.coverage ?? null,
      value: verdict?.value ?? null,
      usual: verdict?.usual ?? null,
      p10: verdict?.p10 ?? null,
      p90: verdict?.p90 ?? null,
      threshold: verdict?.threshold ?? null,
      timesUsual: verdict?.timesUsual ?? null,
    },
    tx,
  )
}
