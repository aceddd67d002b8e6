import { useLocation } from 'react-router-dom'

/** What the server put right in an outline just saved; handed on by the page that saved it. */
export function useCreatedRepairs(): string[] {
  const state: unknown = useLocation().state
  if (typeof state !== 'object' || state === null || !('repairs' in state) || !Array.isArray(state.repairs)) return []
  return state.repairs.filter((repair): repair is string => typeof repair === 'string')
}
