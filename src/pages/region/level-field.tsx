import { useId, useState, type FormEvent } from 'react'
import { unitWords } from '../../../shared/figure-text'
import { Button } from '../../components/ui/button'
import { TextField } from '../../components/ui/field'

interface Props {
  unit: string | null
  /** Undefined: the region's own. */
  level: number | undefined
  onChange: (level: number | undefined) => void
}

/** Another level than the region's own; empty goes back to it. */
export function LevelField({ unit, level, onChange }: Props) {
  const [text, setText] = useState(level === undefined ? '' : String(level))
  const [error, setError] = useState<string>()
  const id = useId()
  const take = (event: FormEvent) => {
    event.preventDefault()
    const wanted = text.trim().replace(',', '.')
    const number = Number(wanted)
    setError(wanted !== '' && !Number.isFinite(number) ? 'A level is a number.' : undefined)
    if (wanted === '') onChange(undefined)
    else if (Number.isFinite(number)) onChange(number)
  }
  return (
    <form id={id} onSubmit={take} noValidate className="flex flex-wrap items-end gap-3" data-no-print>
      <div className="w-44">
        <TextField
          label={`Another level${unit && unit !== '1' ? `, ${unitWords(unit)}` : ''}`}
          className="fig"
          inputMode="decimal"
          value={text}
          error={error}
          placeholder="the region's own"
          onChange={(event) => setText(event.target.value)}
        />
      </div>
      <Button type="submit" size="small" className="min-h-11 tab:min-h-10">
        Look
      </Button>
    </form>
  )
}
