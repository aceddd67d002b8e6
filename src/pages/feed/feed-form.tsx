import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { z } from 'zod'
import { cadences, stages, type Feed } from '../../../shared/schemas/feeds'
import { isConflict, sentenceOf } from '../../api/api-error'
import { useChangeFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { SelectField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'

const fields = z.object({
  name: z.string().trim().min(1, 'The feed needs a name.').max(100, 'At most 100 characters.'),
  stage: z.enum(stages),
  cadence: z.enum(cadences),
  processingVersion: z.string().trim().min(1, 'Say the version; 1 if there is none.').max(50, 'At most 50 characters.'),
  fileNamePattern: z.string().trim().max(200, 'At most 200 characters.'),
  freshnessLimitHours: z.number('Give a number of hours.').min(1, 'At least 1 hour.').max(1440, 'At most 1440 hours.'),
  silentAfterHours: z.number('Give a number of hours.').min(1, 'At least 1 hour.').max(2880, 'At most 2880 hours.'),
})
type Fields = z.infer<typeof fields>

export function FeedForm({ feed }: { feed: Feed }) {
  const change = useChangeFeed(feed.id)
  const form = useForm<Fields>({
    resolver: zodResolver(fields),
    defaultValues: {
      name: feed.name,
      stage: feed.stage,
      cadence: feed.cadence,
      processingVersion: feed.processingVersion,
      fileNamePattern: feed.fileNamePattern ?? '',
      freshnessLimitHours: feed.freshnessLimitHours,
      silentAfterHours: feed.silentAfterHours,
    },
  })
  const { errors, isDirty } = form.formState
  const submit = form.handleSubmit((given) => change.mutate({ ...given, cadence: feed.derivedFrom === null ? given.cadence : undefined, version: feed.version, fileNamePattern: given.fileNamePattern || null }))
  return (
    <section>
      <SectionHead>Settings</SectionHead>
      <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-4 pt-3">
        <TextField label="Name" error={errors.name?.message} {...form.register('name')} />
        <div className="grid gap-4 tab:grid-cols-2">
          <SelectField label="Stage" {...form.register('stage')}>
            {stages.map((stage) => (
              <option key={stage}>{stage}</option>
            ))}
          </SelectField>
          <TextField
            label="Processing version"
            className="fig"
            hint="Of the files to come; what was read keeps its own."
            error={errors.processingVersion?.message}
            {...form.register('processingVersion')}
          />
        </div>
        {feed.derivedFrom === null && (
          <SelectField label="Cadence" hint="How often its files come, each for a period of that length." {...form.register('cadence')}>
            {cadences.map((cadence) => (
              <option key={cadence}>{cadence}</option>
            ))}
          </SelectField>
        )}
        <TextField
          label="File names"
          className="fig"
          spellCheck={false}
          hint="{yyyy} {MM} {dd} are the date, * is anything; empty for any name."
          error={errors.fileNamePattern?.message}
          {...form.register('fileNamePattern')}
        />
        <div className="grid gap-4 tab:grid-cols-2">
          <TextField
            label="Told at once up to, hours"
            type="number"
            className="fig"
            hint="Older views raise no letter at once."
            error={errors.freshnessLimitHours?.message}
            {...form.register('freshnessLimitHours', { valueAsNumber: true })}
          />
          <TextField
            label="Silent after, hours"
            type="number"
            className="fig"
            hint="Without a layer for this long."
            error={errors.silentAfterHours?.message}
            {...form.register('silentAfterHours', { valueAsNumber: true })}
          />
        </div>
        {change.error && (
          <Message fault>
            {isConflict(change.error) ? 'Somebody else changed this feed meanwhile. Nothing of yours was written; load the page again.' : sentenceOf(change.error)}
          </Message>
        )}
        {change.isSuccess && !isDirty && <Message>Saved.</Message>}
        <div>
          <Button kind="filled" type="submit" disabled={!isDirty || change.isPending}>
            Save the settings
          </Button>
        </div>
      </form>
    </section>
  )
}
