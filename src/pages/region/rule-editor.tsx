import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import type { Rule } from '../../../shared/schemas/rules'
import { isConflict, sentenceOf } from '../../api/api-error'
import { type RuleDefinition, useChangeRule } from '../../api/rules'
import { Button } from '../../components/ui/button'
import { TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { unitWords } from '../../../shared/figure-text'
import { type RuleNumbers, ruleNumbers, withNumbers } from './simple-rule'

interface Props {
  rule: Rule
  from: RuleDefinition
  numbers: RuleNumbers
  unit: string | null
  onDone: () => void
}

/** Saving writes a new version; the one in force stays in force until the new one is switched on. */
export function RuleEditor({ rule, from, numbers, unit, onDone }: Props) {
  const save = useChangeRule(rule.id)
  const form = useForm<RuleNumbers>({ resolver: zodResolver(ruleNumbers), defaultValues: numbers })
  const errors = form.formState.errors
  const number = { valueAsNumber: true } as const
  const submit = form.handleSubmit((typed) =>
    save.mutate({ version: rule.version, definition: withNumbers(from, typed) }, { onSuccess: onDone }),
  )
  const field = (name: keyof RuleNumbers, label: string) => (
    <TextField
      type="number"
      step="any"
      inputMode="decimal"
      className="fig"
      label={label}
      error={errors[name]?.message}
      {...form.register(name, number)}
    />
  )
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-4 border-l-6 border-ink pl-4">
      <div className="grid gap-4 tab:grid-cols-2">
        {field('absoluteFloor', `Above this level${unit ? `, ${unitWords(unit)}` : ''}`)}
        {field('timesUsual', 'And at least times usual')}
        {field('consecutiveViews', 'On usable views in a row')}
        {field('withinDays', 'Within days')}
        {field('coverageFloorPercent', 'Coverage floor, per cent of the water')}
      </div>
      {save.error && (
        <Message fault>
          {isConflict(save.error) ? 'Somebody else changed this rule meanwhile. Close this, look at the newest version, and change it again.' : sentenceOf(save.error)}
        </Message>
      )}
      <div className="flex flex-wrap gap-3">
        <Button type="submit" disabled={save.isPending}>
          Save as version {Math.max(...rule.versions.map((one) => one.version)) + 1}
        </Button>
        <Button kind="text" onClick={onDone}>
          Leave it as it is
        </Button>
      </div>
    </form>
  )
}
