import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { z } from 'zod'
import type { Feed } from '../../../shared/schemas/feeds'
import { isConflict, sentenceOf } from '../../api/api-error'
import { useChangeFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { CheckField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'
import { rangeEnd, rangeTurned, typedNumber } from '../../lib/valid-range'

const fields = z
  .object({
    hiddenFlags: z.array(z.string()),
    gapFilled: z.boolean(),
    storedLog10: z.boolean(),
    fileUnit: z.string().trim().max(50, 'At most 50 characters.'),
    validMin: rangeEnd,
    validMax: rangeEnd,
  })
  .refine((range) => !rangeTurned(range), { path: ['validMin'], message: 'The valid range ends before it begins.' })
type Fields = z.infer<typeof fields>

/** Which cells are not taken for seen, and what the files do not say of their numbers. */
export function QualityForm({ feed }: { feed: Feed }) {
  const change = useChangeFeed(feed.id)
  const { hiddenFlags, gapFilled, storedLog10, fileUnit, validMin, validMax } = feed
  const form = useForm<Fields>({
    resolver: zodResolver(fields),
    defaultValues: { hiddenFlags, gapFilled, storedLog10, fileUnit: fileUnit ?? '', validMin, validMax },
  })
  const { errors } = form.formState
  const meanings = [...new Set([...feed.flagMeanings, ...hiddenFlags])]
  const submit = form.handleSubmit((given) => change.mutate({ ...given, fileUnit: given.fileUnit || null, version: feed.version }))
  return (
    <section>
      <SectionHead>Which cells count</SectionHead>
      <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-4 pt-3">
        {meanings.length > 0 && (
          <fieldset className="grid gap-x-4 tab:grid-cols-2">
            <legend className="mb-1 text-small text-ink2">Flags that hide a cell</legend>
            {meanings.map((meaning) => (
              <CheckField key={meaning} label={<span className="fig">{meaning}</span>} value={meaning} {...form.register('hiddenFlags')} />
            ))}
          </fieldset>
        )}
        <CheckField
          label="Cells are filled in, and the files do not say which"
          hint="Such a feed raises no alert."
          {...form.register('gapFilled')}
        />
        <CheckField label="Numbers are base-10 logarithms" hint="Where the file does not say so itself." {...form.register('storedLog10')} />
        <TextField
          label="Unit of the file’s numbers"
          className="fig"
          maxLength={50}
          spellCheck={false}
          hint="Where a file names none. Without it such a file waits."
          error={errors.fileUnit?.message}
          {...form.register('fileUnit')}
        />
        <div className="grid gap-4 tab:grid-cols-2">
          <TextField
            label="Valid from"
            inputMode="decimal"
            className="fig"
            hint="Values below are dropped; empty for no limit."
            error={errors.validMin?.message}
            {...form.register('validMin', { setValueAs: typedNumber })}
          />
          <TextField
            label="Valid to"
            inputMode="decimal"
            className="fig"
            hint="Values above are dropped; empty for no limit."
            error={errors.validMax?.message}
            {...form.register('validMax', { setValueAs: typedNumber })}
          />
        </div>
        {change.error && (
          <Message fault>
            {isConflict(change.error) ? 'Somebody else changed this feed meanwhile. Nothing of yours was written; load the page again.' : sentenceOf(change.error)}
          </Message>
        )}
        <div>
          <Button kind="filled" type="submit" disabled={!form.formState.isDirty || change.isPending}>
            Save, and read the history anew
          </Button>
        </div>
      </form>
    </section>
  )
}
