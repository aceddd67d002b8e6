import { zodResolver } from '@hookform/resolvers/zod'
import { lazy, Suspense, useState } from 'react'
import { useForm, type FieldErrors } from 'react-hook-form'
import { stages, type FeedProposal } from '../../../shared/schemas/feeds'
import type { OffingFile } from '../../../shared/schemas/files'
import { useCan } from '../../api/auth'
import { useConfirmFeeds, useCreateFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { CheckField } from '../../components/ui/field'
import { FaultMark } from '../../components/ui/fault-mark'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'
import { countWords } from '../../lib/format'
import { answers, type Answers, answersOf, feedsOf } from './feed-answers'
import { FeedsChoice } from './feeds-choice'
import { KeptStrip } from './kept-strip'
import { Outcomes } from './outcomes'
import { understoodRows } from './understood-rows'
import { PleaseSay, UnderstoodTable } from './understood-table'
import { ValueHistogram } from './value-histogram'
import { VariablesPart } from './variables-part'
import { whatHappens } from './what-happens'

const FileLook = lazy(() => import('./file-look'))

const control =
  'min-h-11 w-full border-0 border-b border-accent bg-sheet px-2 py-1 text-body text-ink placeholder:text-ink3 aria-invalid:border-b-3 aria-invalid:border-rule2 tab:min-h-9'

/** The proposal of a waiting file, with the points only a person can tell; confirming reads the file. */
export function ConfirmFeed({ file, proposal }: { file: OffingFile; proposal: FeedProposal }) {
  const mayConfirm = useCan('feed:confirm')
  const create = useCreateFeed()
  const confirm = useConfirmFeeds(file.id)
  const [shownName, setShownName] = useState(proposal.variable)
  const form = useForm<Answers>({ resolver: zodResolver(answers), defaultValues: answersOf(proposal, file.others) })
  const errors = form.formState.errors
  const given = form.watch()
  const all = file.report?.variables ?? []
  const variable = all.find((one) => one.name === proposal.variable) ?? all[0]
  const shown = all.find((one) => one.name === shownName) ?? variable
  const feeds = feedsOf(proposal, file.others, given)
  const shownFlags = shown === undefined ? [] : given.hiddenFlags
  const submit = form.handleSubmit((typed) => {
    const [one, ...more] = feedsOf(proposal, file.others, typed)
    if (one && more.length === 0) create.mutate({ ...one, fileId: file.id })
    else if (one) confirm.mutate({ feeds: [one, ...more] })
  })
  const several = file.others.length > 0
  const layers = feeds.reduce((sum, feed) => sum + (all.find((one) => one.name === feed.variable)?.times.count ?? 1), 0)
  const busy = create.isPending || confirm.isPending
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="grid grid-cols-[minmax(0,1fr)] gap-8">
      {!mayConfirm && <Message title="An analyst has to confirm the feed.">The file is kept until then.</Message>}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.35fr)_minmax(0,1fr)]">
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
          <section>
            <SectionHead ruled={false}>What was understood</SectionHead>
            <UnderstoodTable rows={variable && file.report ? understoodRows(file.report.format, variable) : []} label="What was understood">
              {mayConfirm && (
                <>
                  {!several && (
                    <PleaseSay item="Name" note={<Note errors={errors} field="name" text="of the feed to be, as lists and letters show it" />}>
                      <input aria-label="Name of the feed" aria-invalid={Boolean(errors.name)} className={control} {...form.register('name')} />
                    </PleaseSay>
                  )}
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
                  <PleaseSay item="Unit" note={<Note errors={errors} field="unit" text={`of the values kept${several ? ` of ${proposal.variable}` : ''}; leave it empty for none`} />}>
                    <input aria-label="Unit" aria-invalid={Boolean(errors.unit)} className={`${control} fig`} {...form.register('unit')} />
                  </PleaseSay>
                  {variable?.fileUnit === null && (
                    <PleaseSay item="Unit of the file" note={<Note errors={errors} field="fileUnit" text="of the numbers as stored, as the file names none; empty for the unit above" />}>
                      <input aria-label="Unit of the file’s numbers" aria-invalid={Boolean(errors.fileUnit)} className={`${control} fig`} {...form.register('fileUnit')} />
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
                </>
              )}
            </UnderstoodTable>
          </section>
          {mayConfirm && several && <FeedsChoice file={file} proposal={proposal} form={form} onShow={setShownName} />}
        </div>
        {shown && (
          <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
            {shown.gridId !== undefined && (
              <Suspense fallback={<div className="hatch aspect-[1.2] opacity-60" />}>
                <FileLook file={file} variable={shown} hiddenFlags={shownFlags} />
              </Suspense>
            )}
            <ValueHistogram variable={shown} />
          </div>
        )}
      </div>
      {shown?.found && <KeptStrip found={shown.found} hiddenFlags={shownFlags} gridCells={shown.grid.rows * shown.grid.columns} />}
      {mayConfirm && proposal.flagMeanings.length > 0 && (
        <fieldset>
          <legend className="pb-1 text-small text-ink2">Flags that hide a cell: cells with a ticked one are not seen. A usual mask may hide a bright bloom.</legend>
          <div className="grid gap-x-6 tab:grid-cols-3 desk:grid-cols-5">
            {proposal.flagMeanings.map((meaning) => (
              <CheckField key={meaning} label={<span className="fig break-all">{meaning}</span>} value={meaning} {...form.register('hiddenFlags')} />
            ))}
          </div>
        </fieldset>
      )}
      {mayConfirm && (
        <section className="grid grid-cols-[minmax(0,1fr)] gap-4 border-t border-ink pt-5">
          <SectionHead ruled={false}>What happens then</SectionHead>
          <Outcomes outcomes={whatHappens(file, feeds)} />
          {(create.error ?? confirm.error) && <Failure error={create.error ?? confirm.error} />}
          <div className="flex flex-wrap items-center gap-4">
            <Button kind="filled" type="submit" disabled={busy}>
              {several ? `Confirm ${countWords(feeds.length, 'feed')}` : 'Confirm the feed'}, read {countWords(layers, 'layer')}
            </Button>
            <span className="text-small text-ink2">Reading goes on by itself; you can leave this page.</span>
          </div>
        </section>
      )}
      {shown && <VariablesPart file={file} shown={shown} onShow={setShownName} />}
    </form>
  )
}

function Note({ errors, field, text }: { errors: FieldErrors<Answers>; field: 'name' | 'processingVersion' | 'unit' | 'fileUnit' | 'fileNamePattern'; text: string }) {
  const message = errors[field]?.message
  if (!message) return text
  return (
    <span role="alert" className="flex items-start gap-2 text-ink">
      <FaultMark /> {message}
    </span>
  )
}
