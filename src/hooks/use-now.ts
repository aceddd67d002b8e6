import { useQuery } from '@tanstack/react-query'
import { useEffect, useState } from 'react'
import { todayQuery } from '../api/today'

/** The server's time, ticking: ages and clocks on every screen follow it, whatever this machine's clock says. */
export function useNow(everyMs = 15_000): number {
  const { data, dataUpdatedAt } = useQuery({ ...todayQuery, enabled: false })
  const [here, setHere] = useState(() => Date.now())
  useEffect(() => {
    const timer = setInterval(() => setHere(Date.now()), everyMs)
    return () => clearInterval(timer)
  }, [everyMs])
  return data ? Date.parse(data.now) + Math.max(0, here - dataUpdatedAt) : here
}
