import { useForm, useWatch } from 'react-hook-form'
import type { GridMasks, NewMask } from '../../../shared/schemas/masks'
import { usualMinShare } from '../../../shared/science/water-mask'
import { sentenceOf } from '../../api/api-error'
import { fieldErrors } from '../../api/field-errors'
import { useMakeMask } from '../../api/masks'
import { Button } from '../../components/ui/button'
import { SelectField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'

interface Fields {
  kind: NewMask['kind']
  from: string
  to: string
  percent: number
}

/** Asks for a mask made from layers; nothing changes until somebody puts it in force. */
export function MakeMask({ feedId, grid, onDone }: { feedId: number; grid: GridMasks; onDone: () => void }) {
  const make = useMakeMask(feedId)
  const period = grid.fullYears ?? { from: grid.oldest, to: grid.newest }
  const form = useForm<Fields>({ defaultValues: { kind: 'valid share', ...period, percent: usualMinShare * 100 } })
  const told = fieldErrors(make.error)
  const kind = useWatch({ control: form.control, name: 'kind' })
  const submit = form.handleSubmit(({ percent, ...given }) => make.mutate({ gridId: grid.gridId, ...given, ...(given.kind === 'own' ? {} : { minShare: percent / 100 }) }, { onSuccess: onDone }))
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="grid gap-4 border-t border-rule pt-3">
      <SelectField
        label="A cell is water where"
        error={told['kind']}
        hint={grid.own ? `The files say what is land: ${grid.own}.` : 'The files carry no land flag and no land or sea mask that Offing understands.'}
        {...form.register('kind')}
      >
        <option value="valid share">it is valid often enough</option>
        {grid.own && <option value="own">the files do not mark land</option>}
      </SelectField>
      <div className="grid gap-4 tab:grid-cols-2">
        <TextField label="From" type="date" className="fig" error={told['from']} {...form.register('from')} />
        <TextField label="To" type="date" className="fig" error={told['to']} {...form.register('to')} />
      </div>
      {kind === 'valid share' && (
        <TextField label="Valid in at least, % of the layers" type="number" min={0} max={100} step="any" className="fig" error={told['minShare']} {...form.register('percent', { valueAsNumber: true })} />
      )}
      <p className="text-small text-ink2">
        Layers that come later in this period change nothing.
        {grid.watchedOnly && ' This grid is too large to be counted whole: what no region holds stays as in the land outline.'}
      </p>
      {make.error && Object.keys(told).length === 0 && <Message fault>{sentenceOf(make.error)}</Message>}
      <div className="flex flex-wrap gap-3">
        <Button kind="filled" type="submit" disabled={make.isPending}>
          Make the mask
        </Button>
        <Button onClick={onDone}>Leave it</Button>
      </div>
    </form>
  )
}
