import { useQuery } from '@tanstack/react-query'
import { Navigate, useLocation } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { ApiError } from '../../api/api-error'
import { meQuery } from '../../api/auth'
import { Failure } from '../ui/failure'
import { Waiting } from '../ui/waiting'
import { Frame } from './frame'

/** Asks who is there; a stranger signs in first and comes back to the page that was asked for. */
export function RequireSession() {
  const { data: me, error, refetch } = useQuery(meQuery)
  const { pathname, search, hash } = useLocation()
  if (error instanceof ApiError && error.status === 401) {
    const asked = pathname + search + hash
    const back = asked === '/' ? '' : `?${new URLSearchParams({ next: asked })}`
    return <Navigate to={paths.signIn.to() + back} replace />
  }
  if (me) return <Frame me={me} />
  return (
    <main className="mx-auto max-w-[1440px] px-4 py-8 tab:px-8">
      {error ? <Failure error={error} onRetry={() => void refetch()} /> : <Waiting label="Looking who is here" />}
    </main>
  )
}
