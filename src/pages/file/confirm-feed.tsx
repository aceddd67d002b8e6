import { zodResolver } from '@hookform/resolvers/zod'
import { lazy, Suspense, useState } from 'react'
import { useForm, useWatch } from 'react-hook-form'
import type { FeedProposal } from '../../../shared/schemas/feeds'
import type { OffingFile } from '../../../shared/schemas/files'
import { useCan } from '../../api/auth'
import { useConfirmFeeds, useCreateFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { CheckField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'
import { countWords } from '../../lib/format'
import { AnswerRows } from './answer-rows'
import { answers, type Answers, answersOf, feedsOf } from './feed-answers'
import { FeedsChoice } from './feeds-choice'
import { KeptStrip } from './kept-strip'
import { Outcomes } from './outcomes'
import { understoodRows } from './understood-rows'
import { UnderstoodTable } from './understood-table'
import { ValueHistogram } from './value-histogram'
import { VariablesPart } from './variables-part'
import { whatHappens } from './what-happens'

const FileLook = lazy(() => import('./file-look'))

/** The proposal of a waiting file, with the points only a person can tell; confirming reads the file. */
export function ConfirmFeed({ file, proposal }: { file: OffingFile; proposal: FeedProposal }) {
  const mayConfirm = useCan('feed:confirm')
  const create = useCreateFeed()
  const confirm = useConfirmFeeds(file.id)
  const [shownName, setShownName] = useState(proposal.variable)
  const form = useForm<Answers>({ resolver: zodResolver(answers), defaultValues: answersOf(proposal, file.others) })
  const [hiddenFlags, taken, others, unit, fileNamePattern] = useWatch({ control: form.control, name: ['hiddenFlags', 'taken', 'others', 'unit', 'fileNamePattern'] })
  const feeds = feedsOf(proposal, file.others, { ...answersOf(proposal), hiddenFlags, taken, others, unit, fileNamePattern })
  const variables = file.report?.variables ?? []
  const variable = variables.find((one) => one.name === proposal.variable) ?? variables[0]
  const shown = variables.find((one) => one.name === shownName) ?? variable
  const layers = feeds.reduce((sum, feed) => sum + (variables.find((one) => one.name === feed.variable)?.times.count ?? 1), 0)
  const several = file.others.length > 0
  const error = create.error ?? confirm.error
  const submit = form.handleSubmit((given) => {
    const [first, ...more] = feedsOf(proposal, file.others, given)
    if (first && more.length === 0) create.mutate({ ...first, fileId: file.id })
    else if (first) confirm.mutate({ feeds: [first, ...more] })
  })
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="grid grid-cols-[minmax(0,1fr)] gap-8">
      {!mayConfirm && <Message title="An analyst has to confirm the feed.">The file is kept until then.</Message>}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.35fr)_minmax(0,1fr)]">
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
          <section>
            <SectionHead ruled={false}>What was understood</SectionHead>
            <UnderstoodTable rows={variable && file.report ? understoodRows(file.report.format, { ...variable, quantity: proposal.quantity }) : []} label="What was understood">
              {mayConfirm && <AnswerRows form={form} proposal={proposal} variable={variable} several={several} />}
            </UnderstoodTable>
          </section>
          {mayConfirm && several && <FeedsChoice file={file} proposal={proposal} form={form} onShow={setShownName} />}
        </div>
        {shown && (
          <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
            {shown.gridId !== undefined && (
              <Suspense fallback={<div className="hatch aspect-[1.2] opacity-60" />}>
                <FileLook file={file} variable={shown} hiddenFlags={hiddenFlags} />
              </Suspense>
            )}
            <ValueHistogram variable={shown} />
          </div>
        )}
      </div>
      {shown?.found && <KeptStrip found={shown.found} hiddenFlags={hiddenFlags} gridCells={shown.grid.rows * shown.grid.columns} />}
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
          {error && <Failure error={error} />}
          <div className="flex flex-wrap items-center gap-4">
            <Button kind="filled" type="submit" disabled={create.isPending || confirm.isPending}>
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
