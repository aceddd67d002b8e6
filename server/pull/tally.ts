import type { PullRun } from '../../shared/schemas/pulls'
import type { PullFailed } from './pull-failed'

export type Counts = Pick<PullRun, 'fetched' | 'unchanged' | 'notThere' | 'failed'>

/** What one run came to. */
export interface Tally extends Counts {
  sentence: string | null
  /** A failure that may be gone if it is asked again soon. */
  worthAskingSoon: boolean
  rest: PullFailed['rest']
  /** Nothing could be asked before this. */
  postponedUntil: number | null
  /** Hosts that had refused before and answered now. */
  forgiven: Set<string>
}

export function emptyTally(): Tally {
  return { fetched: 0, unchanged: 0, notThere: 0, failed: 0, sentence: null, worthAskingSoon: false, rest: null, postponedUntil: null, forgiven: new Set() }
}

/** The first failure says what went wrong; the others are counted. */
export function noteFailure(tally: Tally, fault: PullFailed, name: string): void {
  tally.failed += 1
  tally.sentence ??= fault.endsRun ? fault.message : `${name}: ${fault.message}`
  tally.worthAskingSoon ||= !fault.lasting
  tally.rest ??= fault.rest
}
