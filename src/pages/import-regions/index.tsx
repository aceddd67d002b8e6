import { useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { sentenceOf } from '../../api/api-error'
import { useReadAreas } from '../../api/regions'
import { Button } from '../../components/ui/button'
import { Message } from '../../components/ui/message'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { ChooseFile } from './choose-file'
import { FoundAreas } from './found-areas'

export function Component() {
  const read = useReadAreas()
  const [sent, setSent] = useState<{ file: File; inland: boolean } | null>(null)

  function send(next: { file: File; inland: boolean }) {
    setSent(next)
    read.mutate(next)
  }

  const onLand = read.data?.items.filter((item) => item.refusal?.reason === 'all-land').length ?? 0
  return (
    <Page title="Import regions">
      <Statement
        above={
          <Link className="link font-strong" to={paths.regions.to()}>
            Regions
          </Link>
        }
        detail="GeoJSON, KML or a zipped shapefile, at most 10 MB. Nothing is saved until you say which."
      >
        Import outlines from a file.
      </Statement>
      <ChooseFile again={read.isSuccess} onFile={(file) => send({ file, inland: false })} />
      {read.isPending && <Waiting lines={4} />}
      {read.error && (
        <Message fault title="This file was not taken.">
          {sentenceOf(read.error)}
        </Message>
      )}
      {read.data?.notes.map((note) => (
        <Message key={note}>{note}</Message>
      ))}
      {onLand > 0 && sent && (
        <Message
          title="Is it a lake or a narrow inlet?"
          action={
            <Button size="small" onClick={() => send({ ...sent, inland: true })}>
              Yes, take it too
            </Button>
          }
        >
          The bundled coastline knows neither, and shows only land there. Every cell then counts as water.
        </Message>
      )}
      {read.data && sent && <FoundAreas key={read.submittedAt} reply={read.data} inland={sent.inland} />}
    </Page>
  )
}
