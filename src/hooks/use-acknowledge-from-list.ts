import type { AlertItem } from '../../shared/schemas/alerts'
import { useAcknowledge } from '../api/alerts'

/** Acknowledges the alert as it stands in the list; the version sees to it that nobody else's act is overwritten. */
export function useAcknowledgeFromList(alert: AlertItem): { act: () => void; busy: boolean; error: Error | null } {
  const acknowledge = useAcknowledge(alert.id)
  return {
    act: () => acknowledge.mutate({ version: alert.version }),
    busy: acknowledge.isPending,
    error: acknowledge.error,
  }
}
