import { zodResolver } from '@hookform/resolvers/zod'
import { useForm, type FieldErrors } from 'react-hook-form'
import { stages, type FeedProposal } from '../../../shared/schemas/feeds'
import type { OffingFile } from '../../../shared/schemas/files'
import { useCan } from '../../api/auth'
import { useCreateFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { CheckField } from '../../components/ui/field'
import { FaultMark } from '../../components/ui/fault-mark'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'
import { countWords } from '../../lib/format'
import { answers, type Answers, answersOf, feedOf } from './feed-answers'
import { understoodRows } from './understood-rows'
import { PleaseSay, UnderstoodTable } from './understood-table'

const control =
  'min-h-11 w-full border-0 border-b border-accent bg-sheet px-2 py-1 text-body text-ink placeholder:text-ink3 aria-invalid:border-b-3 aria-invalid:border-rule2 tab:min-h-9'

/** The proposal of a waiting file, with the points only a person can tell; confirming reads the file. */
export function ConfirmFeed({ file, proposal }: { file: OffingFile; proposal: FeedProposal }) {
  const mayConfirm = useCan('feed:confirm')
  const create = useCreateFeed()
  const form = useForm<Answers>({ resolver: zodResolver(answers), defaultValues: answersOf(proposal) })
  const errors = form.formState.errors
  const variable = file.report?.variables.find((one) => one.name === proposal.variable) ?? file.report?.variables[0]
  const submit = form.handleSubmit((given) => create.mutate({ ...feedOf(proposal, given), fileId: file.id }))
  if (!mayConfirm) return <Message title="An analyst has to confirm the feed.">The file is kept until then.</Message>
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <SectionHead ruled={false}>What was understood</SectionHead>
      <UnderstoodTable rows={variable && file.report ? understoodRows(file.report.format, variable) : []} label="What was understood">
        <PleaseSay item="Name" note={<Note errors={errors} field="name" text="of the feed to be, as lists and letters show it" />}>
          <input aria-label="Name of the feed" aria-invalid={Boolean(errors.name)} className={control} {...form.register('name')} />
        </PleaseSay>
        <PleaseSay item="Stage" note="the file does not say">
          <select aria-label="Stage" className={control} {...form.register('stage')}>
            {stages.map((stage) => (
              <option key={stage}>{stage}</option>
            ))}
          </select>
        </PleaseSay>
        <PleaseSay item="Processing version" note={<Note errors={errors} field="processingVersion" text="values of different versions are not compared" />}>
          <input
            aria-label="Processing version"
            aria-invalid={Boolean(errors.processingVersion)}
            className={`${control} fig`}
            {...form.register('processingVersion')}
          />
        </PleaseSay>
        <PleaseSay item="Unit" note={<Note errors={errors} field="unit" text="of the values kept; leave it empty for none" />}>
          <input aria-label="Unit" aria-invalid={Boolean(errors.unit)} className={`${control} fig`} {...form.register('unit')} />
        </PleaseSay>
        {variable?.fileUnit === null && (
          <PleaseSay item="Unit of the file" note={<Note errors={errors} field="fileUnit" text="of the numbers as stored, as the file names none; empty for the unit above" />}>
            <input aria-label="Unit of the file’s numbers" aria-invalid={Boolean(errors.fileUnit)} className={`${control} fig`} {...form.register('fileUnit')} />
          </PleaseSay>
        )}
        {proposal.flagMeanings.length > 0 && (
          <PleaseSay item="Hidden cells" note="cells with a ticked flag are not seen; a usual mask may hide a bright bloom">
            <div className="grid gap-x-4 tab:grid-cols-2">
              {proposal.flagMeanings.map((meaning) => (
                <CheckField key={meaning} label={<span className="fig">{meaning}</span>} value={meaning} {...form.register('hiddenFlags')} />
              ))}
            </div>
          </PleaseSay>
        )}
        <PleaseSay
          item="File names"
          note={<Note errors={errors} field="fileNamePattern" text="which later files belong to it: {yyyy} {MM} {dd} are the date, * is anything; empty for any name" />}
        >
          <input
            aria-label="File-name pattern"
            aria-invalid={Boolean(errors.fileNamePattern)}
            className={`${control} fig`}
            spellCheck={false}
            {...form.register('fileNamePattern')}
          />
        </PleaseSay>
      </UnderstoodTable>
      {create.error && <Failure error={create.error} />}
      <div className="flex flex-wrap items-center gap-4">
        <Button kind="filled" type="submit" disabled={create.isPending}>
          Confirm the feed, read {countWords(variable?.times.count ?? 1, 'layer')}
        </Button>
        <span className="text-small text-ink2">Reading goes on by itself; you can leave this page.</span>
      </div>
    </form>
  )
}

function Note({ errors, field, text }: { errors: FieldErrors<Answers>; field: keyof Answers; text: string }) {
  const message = errors[field]?.message
  if (!message) return text
  return (
    <span role="alert" className="flex items-start gap-2 text-ink">
      <FaultMark /> {message}
    </span>
  )
}
