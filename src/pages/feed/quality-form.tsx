import { useForm } from 'react-hook-form'
import type { Feed } from '../../../shared/schemas/feeds'
import { isConflict, sentenceOf } from '../../api/api-error'
import { useChangeFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { CheckField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'

interface Fields {
  hiddenFlags: string[]
  gapFilled: boolean
  storedLog10: boolean
  fileUnit: string
}

/** Which cells are not taken for seen, and what the files do not say of their numbers. */
export function QualityForm({ feed }: { feed: Feed }) {
  const change = useChangeFeed(feed.id)
  const { hiddenFlags, gapFilled, storedLog10, fileUnit } = feed
  const form = useForm<Fields>({ defaultValues: { hiddenFlags, gapFilled, storedLog10, fileUnit: fileUnit ?? '' } })
  const meanings = [...new Set([...feed.flagMeanings, ...hiddenFlags])]
  const submit = form.handleSubmit((given) => change.mutate({ ...given, fileUnit: given.fileUnit.trim() || null, version: feed.version }))
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
          hint="Where the file names none; empty for the feed’s own unit."
          {...form.register('fileUnit')}
        />
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
