import { useWatch, type UseFormReturn } from 'react-hook-form'
import type { FeedProposal } from '../../../shared/schemas/feeds'
import type { OffingFile } from '../../../shared/schemas/files'
import { FaultMark } from '../../components/ui/fault-mark'
import { SectionHead } from '../../components/ui/page'
import { Table, Th } from '../../components/ui/table'
import type { Answers } from './feed-answers'

interface Props {
  file: OffingFile
  proposal: FeedProposal
  form: UseFormReturn<Answers>
  onShow: (variable: string) => void
}

const nameBox =
  'min-h-11 w-full min-w-44 border-0 border-b border-accent bg-sheet px-2 py-1 text-body text-ink disabled:border-rule2 disabled:text-ink3 aria-invalid:border-b-3 aria-invalid:border-rule2 tab:min-h-9'

/** All feeds that one file could serve: what is ticked is made at once, and the file is read once. */
export function FeedsChoice({ file, proposal, form, onShow }: Props) {
  const { register, formState } = form
  const [taken, others] = useWatch({ control: form.control, name: ['taken', 'others'] })
  const rows = [
    { one: proposal, taken, field: 'taken' as const, nameField: 'name' as const, error: formState.errors.name?.message },
    ...file.others.map((one, i) => ({
      one,
      taken: others[i]?.taken ?? false,
      field: `others.${i}.taken` as const,
      nameField: `others.${i}.name` as const,
      error: formState.errors.others?.[i]?.name?.message,
    })),
  ]
  const bands = rows.every(({ one }) => one.quantity === 'reflectance')
  return (
    <section>
      <SectionHead ruled={false} count={`${rows.filter((row) => row.taken).length} of ${rows.length}`}>
        {bands ? 'Bands to read, a feed each' : 'Feeds this file can serve'}
      </SectionHead>
      <Table label="Feeds to make" role="table">
        <thead className="max-tab:hidden">
          <tr>
            <Th className="w-14">Read</Th>
            <Th figures className="w-24">Wavelength</Th>
            <Th>Variable</Th>
            <Th>Name of the feed</Th>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ one, taken: read, field, nameField, error }) => (
            <tr key={one.variable} role="row" className="border-b border-rule max-tab:grid max-tab:grid-cols-[auto_auto_minmax(0,1fr)] max-tab:items-center max-tab:pb-2">
              <td role="cell" className="py-1 pr-4">
                <label className="grid min-h-11 min-w-11 place-items-center justify-items-start tab:min-h-9 tab:min-w-9">
                  <input type="checkbox" aria-label={`Read ${one.variable}`} className="size-4.5 accent-accent" {...register(field)} />
                </label>
              </td>
              <td role="cell" className="fig py-1 pr-4 text-right whitespace-nowrap">{wavelengthOf(file, one.variable)}</td>
              <td role="cell" className="py-1 pr-4">
                <button type="button" className="link fig min-h-11 break-all text-left tab:min-h-0" onClick={() => onShow(one.variable)}>
                  {one.variable}
                </button>
              </td>
              <td role="cell" className="py-1 max-tab:col-span-3">
                <input aria-label={`Name of the feed of ${one.variable}`} aria-invalid={Boolean(error)} disabled={!read} className={nameBox} {...register(nameField)} />
                {error && <Fault>{error}</Fault>}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      {formState.errors.taken?.message && <Fault>{formState.errors.taken.message}</Fault>}
    </section>
  )
}

function Fault({ children }: { children: string }) {
  return (
    <p role="alert" className="mt-1 flex items-start gap-2 text-small text-ink">
      <FaultMark /> {children}
    </p>
  )
}

function wavelengthOf(file: OffingFile, name: string): string {
  const nm = file.report?.variables.find((variable) => variable.name === name)?.wavelengthNm
  return nm == null ? '' : `${nm} nm`
}
