import type { UseFormReturn } from 'react-hook-form'
import { stages, type FeedProposal } from '../../../shared/schemas/feeds'
import type { ReportVariable } from '../../../shared/schemas/files'
import { FaultMark } from '../../components/ui/fault-mark'
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
  return (
    <>
      {!several && text('name', 'Name of the feed', 'of the feed to be, as lists and letters show it', 'Name', false)}
      <PleaseSay item="Stage" note="the file does not say">
        <select aria-label="Stage" className={control} {...register('stage')}>
          {stages.map((stage) => (
            <option key={stage}>{stage}</option>
          ))}
        </select>
      </PleaseSay>
      {text('processingVersion', 'Processing version', 'values of different versions are not compared')}
      {text('unit', 'Unit', `of the values kept${several ? ` of ${proposal.variable}` : ''}; leave it empty for none`)}
      {variable?.fileUnit === null && text('fileUnit', 'Unit of the file’s numbers', 'as stored, as the file names none; empty for the unit above', 'Unit of the file')}
      {text('fileNamePattern', 'File-name pattern', 'which later files belong to it: {yyyy} {MM} {dd} are the date, * is anything; empty for any name', 'File names')}
    </>
  )
}

function Fault({ children }: { children: string }) {
  return (
    <span role="alert" className="flex items-start gap-2 text-ink">
      <FaultMark /> {children}
    </span>
  )
}
