import type { Subscription } from '../../../shared/schemas/duty'
import { sentenceOf } from '../../api/api-error'
import { useDeleteSubscription } from '../../api/subscriptions'
import { ConfirmByName } from '../../components/ui/confirm-by-name'

export function EndSubscription({ subscription, onClose }: { subscription: Subscription; onClose: () => void }) {
  const end = useDeleteSubscription(subscription.id)
  return (
    <ConfirmByName
      open
      onOpenChange={(open) => !open && onClose()}
      title={`End the subscription of ${subscription.userName}`}
      about="No more letters come from it. A pause keeps it and ends by itself."
      name={subscription.userName}
      act="End the subscription"
      busy={end.isPending}
      error={end.error ? sentenceOf(end.error) : undefined}
      onConfirm={() => end.mutate(undefined, { onSuccess: onClose })}
    />
  )
}
