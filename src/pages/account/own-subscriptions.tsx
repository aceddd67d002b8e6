import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Me } from '../../../shared/schemas/auth'
import { subscriptionsQuery } from '../../api/subscriptions'
import { Button } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { SectionHead } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { SubscriptionDialog } from '../subscriptions/subscription-dialog'
import { SubscriptionTable } from '../subscriptions/subscription-table'

export function OwnSubscriptions({ me }: { me: Me }) {
  const subscriptions = useQuery(subscriptionsQuery())
  const [adding, setAdding] = useState(false)
  const own = subscriptions.data?.items.filter((one) => one.userId === me.id) ?? []
  const add = (
    <Button size="small" onClick={() => setAdding(true)}>
      Subscribe
    </Button>
  )
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHead ruled={own.length === 0} count={own.length || undefined}>
        What you hear of
      </SectionHead>
      {subscriptions.isPending && <Waiting />}
      {subscriptions.error && <Failure error={subscriptions.error} onRetry={() => void subscriptions.refetch()} />}
      {subscriptions.isSuccess && own.length === 0 && (
        <Empty title="No letters come to you." action={add}>
          Subscribe to the regions you answer for.
        </Empty>
      )}
      {own.length > 0 && <SubscriptionTable subscriptions={own} />}
      {own.length > 0 && <div>{add}</div>}
      {adding && <SubscriptionDialog onClose={() => setAdding(false)} />}
    </section>
  )
}
