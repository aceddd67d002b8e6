import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Rule } from '../../../shared/schemas/rules'
import { useCan } from '../../api/auth'
import { feedsQuery } from '../../api/feeds'
import { rulesQuery } from '../../api/rules'
import { Button } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { SectionHead } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { RuleEditor } from './rule-editor'
import { RuleVersions } from './rule-versions'
import { numbersOf } from './simple-rule'

/** Each rule in one sentence, its versions, and its numbers to change. */
export function RulePart({ regionId, reading }: { regionId: number; reading: boolean }) {
  const rules = useQuery(rulesQuery(regionId))
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <SectionHead>When it counts as unusual</SectionHead>
      {rules.isPending && <Waiting />}
      {rules.error && <Failure error={rules.error} onRetry={() => void rules.refetch()} />}
      {rules.data?.items.length === 0 && (
        <Empty title="No rule yet.">
          {reading
            ? 'The first one is written when the history has been read.'
            : 'Without one this region is shown but never judged. The first comes with the first chlorophyll feed that covers it.'}
        </Empty>
      )}
      {rules.data?.items.map((rule) => (
        <OneRule key={rule.id} rule={rule} />
      ))}
    </section>
  )
}

function OneRule({ rule }: { rule: Rule }) {
  const mayEdit = useCan('rule:edit')
  const [editing, setEditing] = useState(false)
  const feed = useQuery(feedsQuery()).data?.items.find((one) => one.id === rule.feedId)
  const newest = rule.versions.toSorted((a, b) => b.version - a.version)[0]
  const shown = rule.versions.find((one) => one.version === rule.activeVersion) ?? newest
  const numbers = newest && numbersOf(newest.definition)
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <div>
        <p className="text-small text-ink2">
          {rule.name}, {feed?.name ?? 'its feed'},{' '}
          {rule.activeVersion === null ? 'not switched on' : `version ${rule.activeVersion} in force`}
        </p>
        <p className="max-w-prose">{shown?.text}</p>
      </div>
      {mayEdit && !editing && numbers && (
        <div>
          <Button size="small" onClick={() => setEditing(true)}>
            Change its numbers
          </Button>
        </div>
      )}
      {mayEdit && !numbers && <p className="text-small text-ink2">This rule has a shape of its own; its numbers are not changed here.</p>}
      {editing && newest && numbers && <RuleEditor rule={rule} from={newest.definition} numbers={numbers} unit={feed?.unit ?? null} onDone={() => setEditing(false)} />}
      <RuleVersions rule={rule} mayActivate={mayEdit} />
    </div>
  )
}
