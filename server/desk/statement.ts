import { figureText, timesText, unitWords } from '../../shared/figure-text'
import type { Evidence } from '../../shared/schemas/alerts'
import type { Severity } from '../../shared/schemas/common'
import type { AlertRow } from '../models/alert'
import type { EventRow } from '../models/event'

export interface Statement {
  lead: string
  rest: string
}

/** The sentence at the head of an alert: severity, then where the water stands against what is usual. */
export function alertStatement(severity: Severity, regionName: string, evidence: Evidence): Statement {
  const stands =
    evidence.timesUsual === null
      ? `${figureText(evidence.value)}${evidence.unit ? ` ${unitWords(evidence.unit)}` : ''}`
      : `${timesText(evidence.timesUsual)} times usual`
  return { lead: `${severity}.`, rest: `${regionName} is at ${stands}.` }
}

/** How an alert came about: when its event began, between which views, and where it is now. */
export function alertStory(event: EventRow | null, alert: AlertRow): string {
  if (!event) return `Raised for ${dayText(alert.triggerDay)}; late data took the event away.`
  const { firstFlagged, lastUnflaggedBefore: before, lastFlagged } = event
  const began = before === null || before === firstFlagged - 1 ? dayText(firstFlagged) : `${dayText(before)} to ${dayText(firstFlagged)}`
  const views = `${event.usableViews} usable view${event.usableViews === 1 ? '' : 's'}`
  if (event.phase === 'running') return `Building since ${began}; ${views}, the newest flagged on ${dayText(lastFlagged)}.`
  if (event.phase === 'lost') return `Lost from view since ${dayText(lastFlagged)}; it began ${began}.`
  if (event.endedBecause !== null) return `Ended because ${event.endedBecause}; it began ${began}, last flagged on ${dayText(lastFlagged)}.`
  return `Ended after ${dayText(lastFlagged)}; it began ${began}.`
}

function dayText(day: number): string {
  return new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', timeZone: 'UTC' }).format(day * 86_400_000)
}

/** The figures behind it in one line. */
export function evidenceLine(evidence: Evidence): string {
  const unit = evidence.unit ? ` ${unitWords(evidence.unit)}` : ''
  const usual = evidence.usual === null ? '' : ` where ${figureText(evidence.usual)} is usual`
  const range = evidence.p10 === null || evidence.p90 === null ? '' : ` (${figureText(evidence.p10)} to ${figureText(evidence.p90)}, p10 to p90)`
  return `${figureText(evidence.value)}${unit}${usual}${range}; ${Math.round(evidence.coverage * 100)} % of the water was seen.`
}
