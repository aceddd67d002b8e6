import { useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { AlertItem } from '../../../shared/schemas/alerts'
import { Mark, severityMark } from '../ui/mark'

/**
 * Says when an alert is raised while the page is open. It stands over the foot of the page, so nothing moves under the
 * pointer.
 */
export function NewAlerts({ open }: { open: readonly AlertItem[] | undefined }) {
  const [known, setKnown] = useState<ReadonlySet<number>>()
  const [shown, setShown] = useState<AlertItem>()
  if (open && !known) setKnown(new Set(open.map((alert) => alert.id)))
  const fresh = known && open?.find((alert) => !known.has(alert.id))
  if (known && fresh) {
    setKnown(new Set([...known, fresh.id]))
    setShown(fresh)
  }
  const still = shown && open?.some((alert) => alert.id === shown.id)
  return (
    <div aria-live="polite" className="fixed inset-x-4 bottom-20 z-[1050] tab:inset-x-auto tab:right-8 tab:bottom-6 tab:w-96">
      {shown && still && (
        <div className="flex items-center gap-3 border border-l-6 border-ink bg-sheet px-4 py-3">
          <Mark name={severityMark(shown.severity)} className="text-ember" />
          <span className="flex-1">
            <b className="font-heading">{shown.regionName}</b>, {shown.severity}, just raised
          </span>
          <Link className="link" to={paths.alert.to({ id: shown.id })} onClick={() => setShown(undefined)}>
            Open
          </Link>
          <button type="button" className="link" onClick={() => setShown(undefined)}>
            Later
          </button>
        </div>
      )}
    </div>
  )
}
