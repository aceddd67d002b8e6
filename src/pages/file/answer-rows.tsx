import type { UseFormReturn } from 'react-hook-form'
import { cadences, stages, type FeedProposal } from '../../../shared/schemas/feeds'
import type { ReportVariable } from '../../../shared/schemas/files'
import { FaultMark } from '../../components/ui/fault-mark'
import { typedNumber } from '../../lib/valid-range'
import type { Answers } from './feed-answers'
import { PleaseSay } from './understood-table'

const control =
  'min-h-11 w-full border-0 border-b border-accent bg-sheet px-2 py-1 text-body text-ink placeholder:text-ink3 aria-invalid:border-b-3 aria-invalid:border-rule2 tab:min-h-9'

type TextAnswer = 'name' | 'processingVersion' | 'unit' | 'fileUnit' | 'fileNamePattern'

interface Props {
  form: UseFormReturn<Answers>
  proposal: FeedProposal
  variable: ReportVariable | undefined
  /** Further feeds are proposed with it: each has its name in a list of its own. */
  several: boolean
}

/** What the file does not say and a person has to. */
export function AnswerRows({ form, proposal, variable, several }: Props) {
  const { register, formState } = form
  const text = (field: TextAnswer, label: string, note: string, item = label, mono = true) => {
    const fault = formState.errors[field]?.message
    return (
      <PleaseSay key={field} item={item} note={fault ? <Fault>{fault}</Fault> : note}>
        <input aria-label={label} aria-invalid={fault !== undefined} spellCheck={false} className={`${control} ${mono ? 'fig' : ''}`} {...register(field)} />
      </PleaseSay>
    )
  }
  const rangeEnd = (field: 'validMin' | 'validMax', label: string, placeholder: string) => (
    <input
      aria-label={label}
      aria-invalid={formState.errors[field] !== undefined}
      placeholder={placeholder}
      inputMode="decimal"
      className={`${control} fig`}
      {...register(field, { setValueAs: typedNumber })}
    />
  )
  const rangeFault = formState.errors.validMin?.message ?? formState.errors.validMax?.message
  const ofWhich = several ? ` of ${proposal.variable}` : ''
  return (
    <>
      {!several && text('name', 'Name of the feed', 'of the feed to be, as lists and letters show it', 'Name', false)}
      <PleaseSay item="Stage" note={stageNote(proposal.stage)}>
        <select aria-label="Stage" className={control} {...register('stage')}>
          {stages.map((stage) => (
            <option key={stage}>{stage}</option>
          ))}
        </select>
      </PleaseSay>
      <PleaseSay item="Cadence" note="worked out from its times; change it where they mislead">
        <select aria-label="Cadence" className={control} {...register('cadence')}>
          {cadences.map((cadence) => (
            <option key={cadence}>{cadence}</option>
          ))}
        </select>
      </PleaseSay>
      {text('processingVersion', 'Processing version', 'values of different versions are not compared')}
      {text('unit', 'Unit', `of the values kept${ofWhich}; leave it empty for none`)}
      {variable?.fileUnit === null && text('fileUnit', 'Unit of the file’s numbers', 'as stored. The file names none: what is confirmed here says it, for later files too; empty for the unit above', 'Unit of the file')}
      {!variable?.conversion?.includes('logarithm') && (
        <PleaseSay item="Numbers" note={`the file does not say that its numbers${ofWhich} are logarithms; tick it where they are`}>
          <label className="flex min-h-11 items-center gap-3 px-2 tab:min-h-9">
            <input type="checkbox" className="size-4.5 shrink-0 accent-accent" {...register('storedLog10')} />
            base-10 logarithms
          </label>
        </PleaseSay>
      )}
      <PleaseSay item="Valid range" note={rangeFault ? <Fault>{rangeFault}</Fault> : `values${ofWhich} beyond it are dropped, in the unit above; empty for no limit`}>
        <div className="grid grid-cols-2 gap-3">
          {rangeEnd('validMin', 'Valid from', 'from')}
          {rangeEnd('validMax', 'Valid to', 'to')}
        </div>
      </PleaseSay>
      {text('fileNamePattern', 'File-name pattern', 'which later files belong to it: {yyyy} {MM} {dd} are the date, * is anything; empty for any name', 'File names')}
    </>
  )
}

function stageNote(stage: FeedProposal['stage']): string {
  return stage === 'reprocessed' ? 'the file says so itself; change it where that misleads' : 'near-real-time unless the file says otherwise'
}

function Fault({ children }: { children: string }) {
  return (
    <span role="alert" className="flex items-start gap-2 text-ink">
      <FaultMark /> {children}
    </span>
  )
}
