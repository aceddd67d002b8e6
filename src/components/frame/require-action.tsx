import { Outlet } from 'react-router-dom'
import type { Action } from '../../../shared/permissions'
import { useCan } from '../../api/auth'
import { Message } from '../ui/message'
import { Page } from '../ui/page'

/** Pages a person may not use say so instead of failing call by call. */
export function RequireAction({ action }: { action: Action }) {
  if (useCan(action)) return <Outlet />
  return (
    <Page title="Not for your role">
      <Message fault title="This page needs another role.">
        Ask an administrator if you should have it.
      </Message>
    </Page>
  )
}
