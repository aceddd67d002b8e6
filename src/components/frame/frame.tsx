import { useQuery } from '@tanstack/react-query'
import { useEffect } from 'react'
import { Outlet, ScrollRestoration, useLocation } from 'react-router-dom'
import type { Me } from '../../../shared/schemas/auth'
import { alertsQuery } from '../../api/alerts'
import { todayQuery } from '../../api/today'
import { useSessionRenewal } from '../../hooks/use-session-renewal'
import { useStream } from '../../hooks/use-stream'
import { Masthead } from './masthead'
import { NewAlerts } from './new-alerts'
import { RoomBar } from './room-bar'

/** What every page of a signed-in person stands in. */
export function Frame({ me }: { me: Me }) {
  useStream()
  useSessionRenewal()
  useQuery(todayQuery)
  const open = useQuery(alertsQuery({ state: 'open' })).data?.items
  const held = useQuery(alertsQuery({ state: 'acknowledged' })).data?.items
  const count = open && held && open.length + held.length
  return (
    <>
      <a href="#content" className="heard focus:not-sr-only focus:fixed focus:top-2 focus:left-2 focus:z-[1300] focus:bg-sheet focus:p-3">
        To the content
      </a>
      <Masthead me={me} openAlerts={count} />
      <NewAlerts open={open} />
      <FocusOnTurn />
      <Outlet />
      <RoomBar me={me} openAlerts={count} />
      <ScrollRestoration />
    </>
  )
}

/** After a turn to another page the reader starts at its content, not at the masthead again. */
function FocusOnTurn() {
  const { pathname } = useLocation()
  useEffect(() => {
    if (document.activeElement === document.body) document.getElementById('content')?.focus({ preventScroll: true })
  }, [pathname])
  return null
}
