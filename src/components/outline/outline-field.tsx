import { useState } from 'react'
import { type RegionGeometry, regionGeometry } from '../../../shared/schemas/regions'
import { Button } from '../ui/button'
import { TextArea } from '../ui/field'
import { outlineText } from './outline-text'
import { parseOutline } from './parse-outline'

interface Props {
  geometry: RegionGeometry | null
  onGeometry: (geometry: RegionGeometry) => void
}

/** The outline as text: to paste one, or to put corners right by numbers. */
export function OutlineField({ geometry, onGeometry }: Props) {
  const [typed, setTyped] = useState<string | null>(null)
  const [problem, setProblem] = useState<string>()
  const [from, setFrom] = useState(geometry)
  if (geometry !== from) {
    setFrom(geometry)
    setTyped(null)
    setProblem(undefined)
  }
  const text = typed ?? (geometry ? outlineText(geometry) : '')

  function use() {
    const parsed = parseOutline(text)
    if (parsed.problem !== undefined) return setProblem(parsed.problem)
    const read = regionGeometry.safeParse(parsed.geometry)
    if (!read.success) return setProblem('Each ring needs at least four positions of longitude and latitude, the last one like the first.')
    setProblem(undefined)
    onGeometry(read.data)
  }

  return (
    <div className="grid gap-2">
      <TextArea
        label="Outline as text"
        hint="A corner a line, latitude first: 51.95, -10.70 or 51 57.0 N, 10 42.0 W. Or GeoJSON."
        error={problem}
        rows={6}
        className="fig"
        spellCheck={false}
        value={text}
        onChange={(event) => setTyped(event.target.value)}
      />
      <div>
        <Button size="small" disabled={typed === null} onClick={use}>
          Use this outline
        </Button>
      </div>
    </div>
  )
}
