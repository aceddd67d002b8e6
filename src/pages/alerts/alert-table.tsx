import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { AlertItem } from '../../../shared/schemas/alerts'
import { useMe } from '../../api/auth'
import { Mark, severityMark } from '../../components/ui/mark'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { useWide } from '../../hooks/use-wide'
import { dayAndTime } from '../../lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { figure, percent, timesUsual } from '../../lib/format'
import { holderWords } from './holder-words'

export function AlertTable({ alerts }: { alerts: readonly AlertItem[] }) {
  const wide = useWide()
  const me = useMe()
  const zone = me?.timeZone ?? 'UTC'
  if (!wide) {
    return (
      <ul className="border-t border-ink">
        {alerts.map((alert) => (
          <PhoneRow key={alert.id} alert={alert} zone={zone} myId={me?.id} />
        ))}
      </ul>
    )
  }
  const units = [...new Set(alerts.map((alert) => unitWords(alert.evidence.unit)))]
  const unit = units.length === 1 && units[0] ? `, ${units[0]}` : ''
  return (
    <Table label="Alerts">
      <thead>
        <tr>
          <Th>Severity</Th>
          <Th>Region</Th>
          <Th figures>Times usual</Th>
          <Th figures>Value{unit}</Th>
          <Th figures>Coverage</Th>
          <Th className="pl-6">Raised</Th>
          <Th>State</Th>
          <Th>Who</Th>
        </tr>
      </thead>
      <tbody>
        {alerts.map((alert) => (
          <Tr key={alert.id} className="relative">
            <Td>
              <Severity alert={alert} />
            </Td>
            <Td>
              <Link to={paths.alert.to({ id: alert.id })} className="text-body font-strong after:absolute after:inset-0 hover:text-accent">
                {alert.regionName}
              </Link>
            </Td>
            <Td figures className={alert.state === 'closed' ? '' : 'font-heading text-ember'}>
              {alert.evidence.timesUsual !== null && timesUsual(alert.evidence.timesUsual)}
            </Td>
            <Td figures>
              {figure(alert.evidence.value)}
              {unit === '' && ` ${unitWords(alert.evidence.unit)}`}
            </Td>
            <Td figures>{percent(alert.evidence.coverage)}</Td>
            <Td className="fig pl-6 whitespace-nowrap">{dayAndTime(alert.raisedAt, zone)}</Td>
            <Td>
              <StateOf alert={alert} />
            </Td>
            <Td className="text-ink2">{holderWords(alert, me?.id)}</Td>
          </Tr>
        ))}
      </tbody>
    </Table>
  )
}

function PhoneRow({ alert, zone, myId }: { alert: AlertItem; zone: string; myId: number | undefined }) {
  return (
    <li className="relative grid gap-0.5 border-b border-rule py-3">
      <div className="flex items-center justify-between gap-3">
        <Link to={paths.alert.to({ id: alert.id })} className="flex min-w-0 items-center gap-2.5 font-strong after:absolute after:inset-0">
          <Mark name={severityMark(alert.severity)} size={20} className={alert.state === 'closed' ? 'text-ink2' : 'text-ember'} />
          <span className="truncate">{alert.regionName}</span>
          <span className="font-text">{alert.severity}</span>
        </Link>
        {alert.evidence.timesUsual !== null && (
          <span className={`fig whitespace-nowrap ${alert.state === 'closed' ? 'text-ink2' : 'font-heading text-ember'}`}>{timesUsual(alert.evidence.timesUsual)} ×</span>
        )}
      </div>
      <p className="pl-7.5 text-small text-ink2">
        <StateOf alert={alert} />, raised <span className="fig">{dayAndTime(alert.raisedAt, zone)}</span>
      </p>
      <p className="pl-7.5 text-small text-ink2">{holderWords(alert, myId)}</p>
    </li>
  )
}

function Severity({ alert }: { alert: AlertItem }) {
  return (
    <span className="inline-flex items-center gap-2 whitespace-nowrap">
      <Mark name={severityMark(alert.severity)} size={18} className={alert.state === 'closed' ? 'text-ink2' : 'text-ember'} />
      {alert.severity}
    </span>
  )
}

/** Open is said in ember: it is overdue until somebody has it. */
function StateOf({ alert }: { alert: AlertItem }) {
  if (alert.state === 'open') return <span className="font-strong text-ember">open</span>
  return <span>{alert.state === 'closed' && alert.outcome ? `closed: ${alert.outcome}` : alert.state}</span>
}
