import type { FeedPull } from '../../../shared/schemas/pulls'
import { useMe } from '../../api/auth'
import { Age } from '../../components/ui/age'
import { Fact, Facts } from '../../components/ui/facts'
import { FaultMark } from '../../components/ui/fault-mark'
import { dayAndTime, zoneWord } from '../../lib/dates'
import { credentialWords, everyWords, lookBackWords, runWords } from './pull-words'

/** What the feed asks for, when, and what came of it. */
export function PullState({ pull, settings }: { pull: FeedPull; settings: NonNullable<FeedPull['settings']> }) {
  const zone = useMe()?.timeZone ?? 'UTC'
  return (
    <>
      <Facts>
        <Fact name="Address">
          <span className="fig wrap-anywhere">{settings.address}</span>
        </Fact>
        {pull.example && pull.example !== settings.address && (
          <Fact name="Today">
            <span className="fig wrap-anywhere">{pull.example}</span>
          </Fact>
        )}
        <Fact name="Asked">{everyWords(settings)}</Fact>
        <Fact name="Looks back">{lookBackWords(settings.lookBackDays)}</Fact>
        <Fact name="Credentials">{credentialWords[settings.credentials]}</Fact>
        <Fact name="Last">{pull.lastRun ? <LastRun run={pull.lastRun} /> : 'not yet'}</Fact>
        <Fact name="Next">
          {pull.running ? 'now' : pull.nextDueAt && <span className="tabular-nums">{`${dayAndTime(pull.nextDueAt, zone)} ${zoneWord(pull.nextDueAt, zone)}`}</span>}
        </Fact>
      </Facts>
      {pull.runs.length > 1 && <EarlierRuns runs={pull.runs.slice(1)} />}
    </>
  )
}

function LastRun({ run }: { run: FeedPull['runs'][number] }) {
  return (
    <span className="flex items-start gap-2">
      {run.outcome === 'failed' && <FaultMark />}
      <span className="min-w-0 break-words">
        <Age at={run.endedAt} /> ago: {runWords(run)}
      </span>
    </span>
  )
}

function EarlierRuns({ runs }: { runs: FeedPull['runs'] }) {
  return (
    <details className="text-small">
      <summary className="link inline-flex min-h-11 cursor-pointer items-center font-strong tab:min-h-8">Earlier fetches</summary>
      <ol className="grid gap-1 pt-1">
        {runs.map((run) => (
          <li key={run.id} className="border-b border-rule py-1">
            <LastRun run={run} />
          </li>
        ))}
      </ol>
    </details>
  )
}
