import { zodResolver } from '@hookform/resolvers/zod'
import { useForm, useWatch } from 'react-hook-form'
import { addressesOf, patternFault } from '../../../shared/address-pattern'
import { pullSteps, type FeedPull } from '../../../shared/schemas/pulls'
import { isConflict, sentenceOf } from '../../api/api-error'
import { fieldErrors } from '../../api/field-errors'
import { useKeepPull } from '../../api/pulls'
import { Button } from '../../components/ui/button'
import { SelectField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { useNow } from '../../hooks/use-now'
import { bodyOf, fields, startOf, type PullFormInput, type PullFormOutput } from './pull-fields'
import { PullCredentialFields } from './pull-credential-fields'
import { stepWords } from './pull-words'

interface Props {
  feedId: number
  settings: FeedPull['settings']
  onDone: () => void
}

export function PullForm({ feedId, settings, onDone }: Props) {
  const keep = useKeepPull(feedId)
  const form = useForm<PullFormInput, unknown, PullFormOutput>({ resolver: zodResolver(fields), defaultValues: startOf(settings) })
  const { errors } = form.formState
  const told = fieldErrors(keep.error)
  const [address = '', stepMinutes = null] = useWatch({ control: form.control, name: ['address', 'stepMinutes'] })
  const example = useExample(address, stepMinutes)
  const submit = form.handleSubmit((given) => keep.mutate(bodyOf(given, settings?.version ?? null), { onSuccess: onDone }))
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-4 pt-3">
      <TextField
        label="Address"
        type="url"
        className="fig"
        spellCheck={false}
        autoComplete="off"
        hint={
          <>
            {'{yyyy} {MM} {dd} {DDD} {HH} {mm} are the date, in UTC. Everybody here can read the address.'}
            {example && <span className="fig mt-1 block wrap-anywhere text-ink2">Today: {example}</span>}
          </>
        }
        error={errors.address?.message ?? told['address']}
        {...form.register('address')}
      />
      {/\{(HH|mm)\}/.test(address) && (
        <SelectField label="One file every" error={errors.stepMinutes?.message} {...form.register('stepMinutes', { setValueAs: (value) => (value === '' || value === null ? null : Number(value)) })}>
          <option value="">{address.includes('{mm}') ? 'please say' : 'hour'}</option>
          {pullSteps.map((minutes) => (
            <option key={minutes} value={minutes}>
              {stepWords(minutes)}
            </option>
          ))}
        </SelectField>
      )}
      <PullCredentialFields form={form} stored={settings?.credentials ?? 'none'} told={told['credentials']} />
      <div className="grid gap-4 tab:grid-cols-3">
        <TextField label="Every, hours" type="number" className="fig" error={errors.everyHours?.message} {...form.register('everyHours', { valueAsNumber: true })} />
        <TextField label="At minute" type="number" className="fig" error={errors.atMinute?.message} {...form.register('atMinute', { valueAsNumber: true })} />
        <TextField label="Look back, days" type="number" className="fig" error={errors.lookBackDays?.message} {...form.register('lookBackDays', { valueAsNumber: true })} />
      </div>
      {keep.error && Object.keys(told).length === 0 && (
        <Message fault>{isConflict(keep.error) ? 'Somebody else changed this meanwhile. Nothing of yours was written; load the page again.' : sentenceOf(keep.error)}</Message>
      )}
      <div className="flex flex-wrap gap-3">
        <Button kind="filled" type="submit" disabled={keep.isPending}>
          {settings ? 'Save what it fetches' : 'Let it fetch'}
        </Button>
        <Button onClick={onDone}>Leave it</Button>
      </div>
    </form>
  )
}

/** The address of today, as it would be asked now. */
function useExample(address: string, stepMinutes: number | null): string | undefined {
  const now = useNow()
  if (address.trim() === '' || patternFault(address.trim())) return undefined
  return addressesOf(address.trim(), { now, lookBackDays: 0, stepMinutes: stepMinutes ? Number(stepMinutes) : null })[0]?.address
}
