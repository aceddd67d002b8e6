import { useState } from 'react'
import { Link, useSearchParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Feed } from '../../../shared/schemas/feeds'
import { formulas } from '../../../shared/science/optics/formulas'
import { sentenceOf } from '../../api/api-error'
import { useCreateFeed } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { SelectField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'

/** Makes a feed that is worked out from the bands of this one's files; what is missing the server says in a sentence. */
export function DeriveFeed({ feed }: { feed: Feed }) {
  const [asked] = useSearchParams()
  const [chosen, setChosen] = useState(() => Math.max(0, formulas.findIndex((one) => one.name === asked.get('formula') && one.version === asked.get('version'))))
  const [name, setName] = useState<string>()
  const create = useCreateFeed()
  const formula = formulas[chosen]!
  const title = name ?? `${formula.title}, version ${formula.version}`.slice(0, 100)
  const bands = [...new Set(formula.bands.map((band) => band.nm[0]))].join(', ')
  const make = () => create.mutate({ name: title.trim(), derivedFrom: feed.id, formula: formula.name, formulaVersion: formula.version }, { onSuccess: () => setName(undefined) })
  return (
    <section>
      <SectionHead>Work out another quantity</SectionHead>
      <form
        noValidate
        className="grid gap-4 pt-3"
        onSubmit={(event) => {
          event.preventDefault()
          make()
        }}
      >
        <SelectField
          label="Formula"
          value={chosen}
          hint={`From reflectance at ${bands} nm. Coefficients ${formula.status}.${formula.caution ? ` ${formula.caution}` : ''}`}
          onChange={(event) => {
            setChosen(Number(event.target.value))
            setName(undefined)
          }}
        >
          {formulas.map((one, at) => (
            <option key={`${one.name} ${one.version}`} value={at}>
              {one.title}, version {one.version}
            </option>
          ))}
        </SelectField>
        <TextField label="Name of the new feed" value={title} maxLength={100} onChange={(event) => setName(event.target.value)} />
        {create.error && <Message fault>{sentenceOf(create.error)}</Message>}
        {create.data && (
          <Message>
            Made{' '}
            <Link className="link" to={paths.feed.to({ id: create.data.id })}>
              {create.data.name}
            </Link>
            . What was read so far is worked out by a job.
          </Message>
        )}
        <div>
          <Button kind="filled" type="submit" disabled={create.isPending || title.trim() === ''}>
            Make the feed
          </Button>
        </div>
      </form>
    </section>
  )
}
