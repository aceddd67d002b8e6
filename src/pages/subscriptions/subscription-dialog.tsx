import { zodResolver } from '@hookform/resolvers/zod'
import { useQuery } from '@tanstack/react-query'
import { useForm, useWatch } from 'react-hook-form'
import { severities } from '../../../shared/schemas/common'
import type { Subscription } from '../../../shared/schemas/duty'
import { sentenceOf } from '../../api/api-error'
import { regionsQuery } from '../../api/regions'
import { useChangeSubscription, useCreateSubscription } from '../../api/subscriptions'
import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import { FaultMark } from '../../components/ui/fault-mark'
import { CheckField, RadioFields, SelectField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { PersonChoice } from './person-choice'
import { bodyOf, formOf, type SubscriptionForm, subscriptionForm } from './subscription-fields'

interface Props {
  subscription?: Subscription
  /** An admin may subscribe anybody. */
  anyPerson?: boolean
  onClose: () => void
}

export function SubscriptionDialog({ subscription, anyPerson = false, onClose }: Props) {
  const create = useCreateSubscription()
  const change = useChangeSubscription(subscription?.id ?? 0)
  const regions = useQuery(regionsQuery()).data?.items.filter((region) => !region.retired) ?? []
  const form = useForm<SubscriptionForm>({ resolver: zodResolver(subscriptionForm), defaultValues: formOf(subscription) })
  const scope = useWatch({ control: form.control, name: 'scope' })
  const { errors } = form.formState
  const error = create.error ?? change.error
  const submit = form.handleSubmit((given) => {
    const done = { onSuccess: onClose }
    if (subscription) change.mutate({ version: subscription.version, ...bodyOf(given) }, done)
    else create.mutate({ ...bodyOf(given), ...(given.userId === '' ? {} : { userId: Number(given.userId) }) }, done)
  })
  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={subscription ? `Subscription of ${subscription.userName}` : 'Add a subscription'}>
      <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-4">
        {anyPerson && !subscription && <PersonChoice register={form.register('userId')} />}
        <RadioFields
          legend="Regions"
          options={[
            { value: 'all', label: 'all regions, also those drawn later' },
            { value: 'some', label: 'only these' },
          ]}
          {...form.register('scope')}
        />
        {scope === 'some' && (
          <fieldset className="max-h-48 overflow-y-auto border-y border-rule pl-7">
            <legend className="heard">Which regions</legend>
            {regions.map((region) => (
              <CheckField key={region.id} label={region.name} value={String(region.id)} {...form.register('regionIds')} />
            ))}
          </fieldset>
        )}
        {errors.regionIds && (
          <p role="alert" className="flex items-start gap-2 text-small">
            <FaultMark /> {errors.regionIds.message}
          </p>
        )}
        <SelectField label="From severity" {...form.register('minimumSeverity')}>
          {severities.map((one) => (
            <option key={one}>{one}</option>
          ))}
        </SelectField>
        <RadioFields
          legend="Letters"
          options={[
            { value: 'at once', label: 'at once' },
            { value: 'daily digest', label: 'in the daily digest' },
          ]}
          {...form.register('delivery')}
        />
        <TextField type="date" label="Paused until" hint="Empty: not paused. It goes on by itself on that day." {...form.register('pausedUntil')} />
        {error && <Message fault>{sentenceOf(error)}</Message>}
        <div className="flex justify-end gap-3">
          <Button onClick={onClose}>Leave it</Button>
          <Button kind="filled" type="submit" disabled={create.isPending || change.isPending}>
            {subscription ? 'Save the changes' : 'Subscribe'}
          </Button>
        </div>
      </form>
    </Dialog>
  )
}
