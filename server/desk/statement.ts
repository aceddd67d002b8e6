import { figureText, timesText } from '../../shared/figure-text'
import type { Evidence } from '../../shared/schemas/alerts'
import type { Severity } from '../../shared/schemas/common'

export interface Statement {
  lead: string
  rest: string
}

/** The sentence at the head of an alert: severity, then where the water stands against what is usual. */
export function alertStatement(severity: Severity, regionName: string, evidence: Evidence): Statement {
  const stands =
    evidence.timesUsual === null
      ? `${figureText(evidence.value)}${evidence.unit ? ` ${evidence.unit}` : ''}`
      : `${timesText(evidence.timesUsual)} times usual`
  return { lead: `${severity}.`, rest: `${regionName} is at ${stands}.` }
}

/** The figures behind it in one line. */
export function evidenceLine(evidence: Evidence): string {
  const unit = evidence.unit ? ` ${evidence.unit}` : ''
  const usual = evidence.usual === null ? '' : ` where ${figureText(evidence.usual)} is usual`
  const range = evidence.p10 === null || evidence.p90 === null ? '' : ` (${figureText(evidence.p10)} to ${figureText(evidence.p90)}, p10 to p90)`
  return `${figureText(evidence.value)}${unit}${usual}${range}; ${Math.round(evidence.coverage * 100)} % of the water was seen.`
}
