import { zodResolver } from '@hookform/resolvers/zod'
import { useForm, useWatch } from 'react-hook-form'
import { closing, notBloomCauses, outcomes, type Alert } from '../../../shared/schemas/alerts'
import { RadioFields, TextArea } from '../../components/ui/field'
import { ActForm } from './act-form'
import type { Acting } from './use-acts'

const asOptions = (words: readonly string[]) => words.map((word) => ({ value: word, label: word }))

/** Closing says what it was: later views and rules are measured against it. */
export function CloseDialog({ alert, acts }: { alert: Alert; acts: Acting }) {
  const form = useForm({ resolver: zodResolver(closing), defaultValues: { note: acts.note, cause: null } })
  const outcome = useWatch({ control: form.control, name: 'outcome' })
  const { errors } = form.formState
  const send = form.handleSubmit((given) => acts.close({ ...given, cause: given.outcome === 'not a bloom' ? given.cause : null }))
  return (
    <ActForm acts={acts} title={`Close ${alert.regionName}`} about="Say what it was. It can be reopened." act="Close" onSubmit={(event) => void send(event)}>
      <RadioFields legend="What it was" options={asOptions(outcomes)} error={errors.outcome && 'Choose one.'} {...form.register('outcome')} />
      {outcome === 'not a bloom' && (
        <RadioFields legend="What it was instead" options={asOptions(notBloomCauses)} error={errors.cause?.message} {...form.register('cause')} />
      )}
      <TextArea label="Note" error={errors.note?.message} {...form.register('note')} />
    </ActForm>
  )
}
