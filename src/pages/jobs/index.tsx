import { useInfiniteQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { jobStates, type Job } from '../../../shared/schemas/running'
import { sentenceOf } from '../../api/api-error'
import { jobsQuery, useActOnJob, type JobAct } from '../../api/jobs'
import { Age } from '../../components/ui/age'
import { Button } from '../../components/ui/button'
import { Choice } from '../../components/ui/choice'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { FaultMark } from '../../components/ui/fault-mark'
import { Page, Statement } from '../../components/ui/page'
import { Progress } from '../../components/ui/progress'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { countAtHead } from '../../lib/format'

type Shown = Job['state'] | 'all'
const options = (['all', ...jobStates] as const).map((value) => ({ value, label: value }))

export function Component() {
  const [shown, setShown] = useState<Shown>('all')
  const jobs = useInfiniteQuery(jobsQuery(shown === 'all' ? undefined : shown))
  const failed = useInfiniteQuery(jobsQuery('failed')).data?.pages[0]?.items.length ?? 0
  const items = jobs.data?.pages.flatMap((page) => page.items) ?? []
  return (
    <Page title="Jobs">
      <Statement detail="Reading, histories and judging, newest first.">{failed > 0 ? `${countAtHead(failed)} ${failed === 1 ? 'job' : 'jobs'} failed.` : 'No job has failed.'}</Statement>
      <Choice label="State" options={options} value={shown} onChange={setShown} />
      {jobs.isPending && <Waiting lines={5} />}
      {jobs.error && <Failure error={jobs.error} onRetry={() => void jobs.refetch()} />}
      {jobs.isSuccess && items.length === 0 && <Empty title={shown === 'all' ? 'No job yet.' : `No job is ${shown}.`} />}
      {items.length > 0 && (
        <Table label="Jobs">
          <thead>
            <tr>
              <Th>What</Th>
              <Th>State</Th>
              <Th figures className="hidden tab:table-cell">
                Attempts
              </Th>
              <Th figures>Changed</Th>
              <Th>
                <span className="heard">Acts</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {items.map((job) => (
              <JobRow key={job.id} job={job} />
            ))}
          </tbody>
        </Table>
      )}
      {jobs.hasNextPage && (
        <div>
          <Button kind="text" disabled={jobs.isFetchingNextPage} onClick={() => void jobs.fetchNextPage()}>
            Older jobs
          </Button>
        </div>
      )}
    </Page>
  )
}

const actsOf: Record<Job['state'], { act: JobAct; word: string }[]> = {
  waiting: [
    { act: 'pause', word: 'Pause' },
    { act: 'cancel', word: 'Cancel' },
  ],
  running: [
    { act: 'pause', word: 'Pause' },
    { act: 'cancel', word: 'Cancel' },
  ],
  paused: [
    { act: 'retry', word: 'Go on' },
    { act: 'cancel', word: 'Cancel' },
  ],
  failed: [
    { act: 'retry', word: 'Try again' },
    { act: 'cancel', word: 'Cancel' },
  ],
  done: [],
  cancelled: [{ act: 'retry', word: 'Start again' }],
}

function JobRow({ job }: { job: Job }) {
  const act = useActOnJob(job.id)
  return (
    <Tr>
      <Td>
        {job.subject}
        <span className="fig block text-fine text-ink3">
          {job.kind} {job.id}
        </span>
        {job.lastError && <span className="block text-fine text-ink2">{job.lastError}</span>}
        {act.error && (
          <span role="alert" className="block text-fine">
            {sentenceOf(act.error)}
          </span>
        )}
      </Td>
      <Td className="min-w-40">
        {job.state === 'running' || job.state === 'paused' ? (
          <Progress done={job.done} total={job.total} label={job.state} />
        ) : (
          <span className="inline-flex items-center gap-2 align-middle">
            {job.state === 'failed' && <FaultMark />}
            {job.state}
          </span>
        )}
      </Td>
      <Td figures className="hidden tab:table-cell">
        {job.attempts}
      </Td>
      <Td figures>
        <Age at={job.updatedAt} />
      </Td>
      <Td>
        <span className="flex flex-wrap justify-end gap-x-4">
          {actsOf[job.state].map(({ act: name, word }) => (
            <Button key={name} kind="text" size="small" disabled={act.isPending} aria-label={`${word}: ${job.subject}`} onClick={() => act.mutate(name)}>
              {word}
            </Button>
          ))}
        </span>
      </Td>
    </Tr>
  )
}
