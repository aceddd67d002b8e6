import type { ReactNode } from 'react'
import type { RegionStateName, Severity } from '../../../shared/schemas/common'

export type MarkName = `state-${'unusual' | 'not-seen' | 'stale' | 'not-ready' | 'not-comparable' | 'usual'}` | `severity-${Lowercase<Severity>}`

export function stateMark(state: RegionStateName): MarkName {
  const marks = {
    unusual: 'state-unusual',
    'not seen': 'state-not-seen',
    stale: 'state-stale',
    'not ready': 'state-not-ready',
    'not comparable': 'state-not-comparable',
    usual: 'state-usual',
  } as const
  return marks[state]
}

export function severityMark(severity: Severity): MarkName {
  const marks = { Minor: 'severity-minor', Moderate: 'severity-moderate', Severe: 'severity-severe', Extreme: 'severity-extreme' } as const
  return marks[severity]
}

/** A mark never stands alone: put its word beside it. */
export function Mark({ name, size = 20, className = '' }: { name: MarkName; size?: number; className?: string }) {
  return (
    <svg aria-hidden width={size} height={size} viewBox="0 0 24 24" className={`inline-block shrink-0 ${className}`}>
      <use href={`#${name}`} />
    </svg>
  )
}

function Worded({ name, word, ember, size = 16, children }: { name: MarkName; word: string; ember: boolean; size?: number; children?: ReactNode }) {
  return (
    <span className={`inline-flex items-center gap-2 whitespace-nowrap ${ember ? 'text-ember' : ''}`}>
      <Mark name={name} size={size} />
      {children ?? word}
    </span>
  )
}

export function StateWord({ state, size }: { state: RegionStateName; size?: number }) {
  return <Worded name={stateMark(state)} word={state} ember={state === 'unusual'} size={size} />
}

export function SeverityWord({ severity, size }: { severity: Severity; size?: number }) {
  return <Worded name={severityMark(severity)} word={severity} ember size={size} />
}
