import type { ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Alert } from '../../../shared/schemas/alerts'
import { useMe } from '../../api/auth'
import { Age } from '../../components/ui/age'
import { Mark, severityMark } from '../../components/ui/mark'
import { dayAndTime, dayWords, zoneWord } from '../../lib/dates'
import { AlertStanding } from './alert-standing'

/** Severity, then where the water stands; below it who has it. */
export function AlertHead({ alert, actions }: { alert: Alert; actions: ReactNode }) {
  const zone = useMe()?.timeZone ?? 'UTC'
  return (
    <header className="grid gap-x-9 gap-y-4 desk:grid-cols-[minmax(0,1fr)_27.5rem]">
      <div className="grid content-start gap-1">
        <p className="text-small text-ink2">
          <Link className="link" to={paths.alerts.to()}>
            Alerts
          </Link>{' '}
          {alert.id}, raised {dayAndTime(alert.raisedAt, zone)} {zoneWord(alert.raisedAt, zone)}, view of {dayWords(alert.evidence.day)},{' '}
          <Age at={alert.evidence.layerObservedAt} old />
        </p>
        <div className="flex items-start gap-3 tab:gap-4">
          <Mark name={severityMark(alert.severity)} size={30} className="mt-0 text-ember tab:mt-1" />
          <h1 className="text-title tab:text-statement">
            <span className="text-ember">{alert.statement.lead}</span> {alert.statement.rest}
          </h1>
        </div>
        <AlertStanding alert={alert} />
      </div>
      {actions}
    </header>
  )
}
