import { lazy, Suspense, useState } from 'react'
import type { ImportedArea, ImportReply } from '../../../shared/schemas/outlines'
import { sentenceOf } from '../../api/api-error'
import { useCreateRegion } from '../../api/regions'
import { SaveButton } from '../../components/region-form/save-button'
import { SectionHead } from '../../components/ui/page'
import { countWords } from '../../lib/format'
import { AreaItem, type AreaState } from './area-item'

const FoundMap = lazy(() => import('./found-map'))
const formId = 'import-regions'

/** What the file holds, on the map and as a list; those ticked are saved under the names typed. */
export function FoundAreas({ reply, inland }: { reply: ImportReply; inland: boolean }) {
  const [areas, setAreas] = useState<AreaState[]>(() => reply.items.map(({ name, found }) => ({ name, ticked: found !== null, regionId: null, problem: undefined })))
  const [saving, setSaving] = useState(false)
  const create = useCreateRegion()
  const change = (place: number, fields: Partial<AreaState>) => setAreas((all) => all.map((one, i) => (i === place ? { ...one, ...fields } : one)))
  const wanted = areas.flatMap((area, i) => (area.ticked && area.regionId === null && reply.items[i]!.found ? [i] : []))
  const taken = reply.items.filter((item) => item.found).length
  const saved = areas.filter((area) => area.regionId !== null).length

  async function save() {
    setSaving(true)
    for (const i of wanted) {
      const name = areas[i]!.name.trim()
      if (name === '') {
        change(i, { problem: 'A region needs a name: it stands on the map and in letters.' })
        continue
      }
      try {
        const timeZone = Intl.DateTimeFormat().resolvedOptions().timeZone
        const region = await create.mutateAsync({ name, geometry: reply.items[i]!.found!.geometry, timeZone, inland })
        change(i, { regionId: region.id, problem: undefined })
      } catch (error) {
        change(i, { problem: sentenceOf(error) })
      }
    }
    setSaving(false)
  }

  return (
    <form
      id={formId}
      noValidate
      className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.3fr)_minmax(0,1fr)]"
      onSubmit={(event) => {
        event.preventDefault()
        void save()
      }}
    >
      <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-3">
        <Suspense fallback={<div className="hatch aspect-[1.2] opacity-60" />}>
          <FoundMap items={reply.items} ticked={areas.map((area) => area.ticked)} />
        </Suspense>
      </div>
      <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-3">
        <SectionHead count={reply.items.length} aside={`${reply.format}, ${reply.fileName}`}>
          Found in the file
        </SectionHead>
        <p aria-live="polite" className="text-small text-ink2">
          {summary(reply.items, taken)} {saved > 0 && `${countWords(saved, 'region')} saved; the history of each is read at once.`}
        </p>
        <ul className="grid">
          {reply.items.map((item, i) => (
            <AreaItem key={i} place={i} item={item} state={areas[i]!} onChange={(fields) => change(i, fields)} />
          ))}
        </ul>
        {wanted.length > 0 && (
          <SaveButton form={formId} disabled={saving}>
            Save {countWords(wanted.length, 'region')}
          </SaveButton>
        )}
      </div>
    </form>
  )
}

function summary(items: readonly ImportedArea[], taken: number): string {
  if (taken === items.length) return items.length === 1 ? 'It can be taken.' : 'All of them can be taken.'
  return taken === 0 ? 'None of them can be taken as it is.' : `${countWords(taken, 'area')} can be taken, ${items.length - taken} cannot.`
}
