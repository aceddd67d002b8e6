import { stringify } from 'csv-stringify/sync'
import type { AlertItem } from '../../shared/schemas/alerts'

/** Alerts as CSV, one row an alert. A text that a spreadsheet would take for a formula is kept a text. */
export function alertsCsv(alerts: readonly AlertItem[]): string {
  const header = [
    'id', 'region', 'feed', 'state', 'phase', 'severity', 'raisedAt', 'triggerDay', 'evidenceDay', 'statistic', 'unit', 'value', 'usual',
    'threshold', 'timesUsual', 'coverage', 'acknowledgedBy', 'acknowledgedAt', 'closedAt', 'outcome', 'cause', 'checksum',
  ]
  const rows = alerts.map((alert) => {
    const { evidence: e } = alert
    return [
      alert.id, asText(alert.regionName), asText(alert.feedName), alert.state, alert.phase, alert.severity, alert.raisedAt, alert.triggerDay, e.day, e.statistic, e.unit, e.value,
      e.usual, e.threshold, e.timesUsual, e.coverage, asText(alert.acknowledgedBy), alert.acknowledgedAt, alert.closedAt, alert.outcome, alert.cause, e.checksum,
    ]
  })
  return stringify([header, ...rows])
}

function asText(value: string | null): string | null {
  return value !== null && /^[=+\-@\t\r]/.test(value) ? `'${value}` : value
}
