import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { subscriptionsQuery } from '../../api/subscriptions'
import { Button } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { countAtHead } from '../../lib/format'
import { SubscriptionDialog } from './subscription-dialog'
import { SubscriptionTable } from './subscription-table'

export function Component() {
  const subscriptions = useQuery(subscriptionsQuery())
  const [adding, setAdding] = useState(false)
  const items = subscriptions.data?.items ?? []
  const people = new Set(items.map((one) => one.userId)).size
  return (
    <Page title="Subscriptions">
      <Statement
        detail="Who gets a letter about which regions, and from which severity."
        actions={
          <Button kind="filled" onClick={() => setAdding(true)}>
            Add a subscription
          </Button>
        }
      >
        {people > 0 ? `${countAtHead(people)} ${people === 1 ? 'person hears' : 'people hear'} of alerts.` : 'Nobody hears of alerts.'}
      </Statement>
      {subscriptions.isPending && <Waiting lines={4} />}
      {subscriptions.error && <Failure error={subscriptions.error} onRetry={() => void subscriptions.refetch()} />}
      {subscriptions.isSuccess && items.length === 0 && (
        <Empty title="No subscription yet.">Without one an alert is shown on the desk, but no letter is written.</Empty>
      )}
      {items.length > 0 && <SubscriptionTable subscriptions={items} withPerson />}
      {adding && <SubscriptionDialog anyPerson onClose={() => setAdding(false)} />}
    </Page>
  )
}
