import { ApiError } from '../../api/api-error'

export interface RunningEvent {
  since: string
  severity: string
  alertIds: number[]
}

/** What the server answers when an outline with a running event would be redrawn; null for anything else. */
export function isEventRunning(error: unknown): RunningEvent | null {
  if (!(error instanceof ApiError) || error.code !== 'event-running') return null
  const { since, severity, alertIds } = error.details
  return {
    since: typeof since === 'string' ? since : '',
    severity: typeof severity === 'string' ? severity : '',
    alertIds: Array.isArray(alertIds) ? alertIds.filter((id): id is number => typeof id === 'number') : [],
  }
}
