import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Subscription } from '../../../shared/schemas/duty'
import { useMe } from '../../api/auth'
import { regionsQuery } from '../../api/regions'
import { Button } from '../../components/ui/button'
import { Mark, severityMark } from '../../components/ui/mark'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { useNow } from '../../hooks/use-now'
import { dayWithYear, localDay } from '../../lib/dates'
import { EndSubscription } from './end-subscription'
import { SubscriptionDialog } from './subscription-dialog'

interface Props {
  subscriptions: readonly Subscription[]
  /** Whose each is; left out on one's own page. */
  withPerson?: boolean
}

export function SubscriptionTable({ subscriptions, withPerson = false }: Props) {
  const [changing, setChanging] = useState<Subscription | null>(null)
  const [ending, setEnding] = useState<Subscription | null>(null)
  return (
    <>
      <Table label="Subscriptions">
        <thead>
          <tr>
            {withPerson && <Th>Person</Th>}
            <Th>Regions</Th>
            <Th>From severity</Th>
            <Th>Letters</Th>
            <Th>
              <span className="heard">Acts</span>
            </Th>
          </tr>
        </thead>
        <tbody>
          {subscriptions.map((one) => (
            <SubscriptionRow key={one.id} subscription={one} withPerson={withPerson} onChange={() => setChanging(one)} onEnd={() => setEnding(one)} />
          ))}
        </tbody>
      </Table>
      {changing && <SubscriptionDialog subscription={changing} onClose={() => setChanging(null)} />}
      {ending && <EndSubscription subscription={ending} onClose={() => setEnding(null)} />}
    </>
  )
}

interface RowProps {
  subscription: Subscription
  withPerson: boolean
  onChange: () => void
  onEnd: () => void
}

function SubscriptionRow({ subscription, withPerson, onChange, onEnd }: RowProps) {
  const regions = useQuery(regionsQuery()).data?.items ?? []
  const zone = useMe()?.timeZone ?? 'UTC'
  const now = useNow()
  const { pausedUntil } = subscription
  const names = subscription.regionIds.map((id) => regions.find((region) => region.id === id)?.name ?? `region ${id}`)
  return (
    <Tr>
      {withPerson && (
        <Td>
          <span className="text-body font-strong">{subscription.userName}</span>
          <span className="fig block text-fine break-all text-ink2">{subscription.email}</span>
        </Td>
      )}
      <Td>{subscription.allRegions ? 'all regions' : names.join(', ')}</Td>
      <Td>
        <span className="inline-flex items-center gap-2 align-middle whitespace-nowrap">
          <Mark name={severityMark(subscription.minimumSeverity)} size={16} /> {subscription.minimumSeverity}
        </span>
      </Td>
      <Td>
        {subscription.delivery}
        {pausedUntil && Date.parse(pausedUntil) > now && (
          <span className="block text-fine text-ink2">
            paused until <span className="fig">{dayWithYear(localDay(pausedUntil, zone))}</span>
          </span>
        )}
      </Td>
      <Td>
        <span className="flex flex-wrap justify-end gap-x-4">
          <Button kind="text" size="small" onClick={onChange}>
            Change
          </Button>
          <Button kind="text" size="small" onClick={onEnd}>
            End
          </Button>
        </span>
      </Td>
    </Tr>
  )
}
