import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Link, useNavigate, useParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Region } from '../../../shared/schemas/regions'
import { isConflict } from '../../api/api-error'
import { type RegionChangeBody, regionQuery, useChangeRegion } from '../../api/regions'
import { bufferOf, contactsOf, fieldsOf, siteOf } from '../../components/region-form/region-fields'
import { RegionForm } from '../../components/region-form/region-form'
import { SaveButton } from '../../components/region-form/save-button'
import { useDrawingGround } from '../../components/region-form/use-drawing-ground'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Message } from '../../components/ui/message'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { AskRedraw } from './ask-redraw'
import { isEventRunning } from './is-event-running'
import { useKept } from './use-kept'

const formId = 'edit-region'

export function Component() {
  const id = Number(useParams()['id'])
  const region = useQuery(regionQuery(id))
  return (
    <Page title={region.data ? `Edit ${region.data.name}` : 'Edit region'}>
      {region.isPending && <Waiting lines={5} />}
      {region.error && <Failure error={region.error} onRetry={() => void region.refetch()} />}
      {region.data && <EditRegion key={id} newest={region.data} />}
    </Page>
  )
}

/** The form keeps the region as it was when it was opened; the server refuses to write over somebody else's change. */
function EditRegion({ newest }: { newest: Region }) {
  const region = useKept(newest)
  const ground = useDrawingGround(region.standing.feedId ?? undefined, region.id)
  const change = useChangeRegion(region.id)
  const navigate = useNavigate()
  const next = region.geometryVersion + 1
  const [asking, setAsking] = useState<RegionChangeBody | null>(null)
  const running = isEventRunning(change.error)
  const stale = isConflict(change.error) && !running

  function save(body: RegionChangeBody, redrawn: boolean) {
    setAsking(body)
    change.mutate(body, { onSuccess: (saved) => void navigate(paths.region.to({ id: saved.id }), { state: { repairs: redrawn ? saved.repairs : [] } }) })
  }
  return (
    <>
      <Statement
        above={
          <Link className="link font-strong" to={paths.region.to({ id: region.id })}>
            {region.name}
          </Link>
        }
        detail={`Outline version ${region.geometryVersion}.`}
        actions={
          <SaveButton form={formId} disabled={change.isPending}>
            Save the changes
          </SaveButton>
        }
      >
        Edit {region.name}.
      </Statement>
      <AskRedraw
        open={running !== null && asking !== null && !change.isPending}
        running={running}
        nextVersion={next}
        onKeep={() => change.reset()}
        onRedraw={() => asking && save({ ...asking, confirm: true }, true)}
      />
      {stale && (
        <Message
          fault
          title="Somebody else changed this region meanwhile."
          action={
            <Button size="small" onClick={() => window.location.reload()}>
              Load it again
            </Button>
          }
        >
          Nothing of yours was written. Load the page again and make your change on the newest state.
        </Message>
      )}
      <RegionForm
        id={formId}
        fields={fieldsOf(region)}
        outline={region.geometry}
        ground={ground}
        error={isConflict(change.error) ? null : change.error}
        redrawn={`The redrawn outline becomes version ${next}: its history is read anew. The figures and alerts of version ${region.geometryVersion} stay as they are.`}
        onSave={(typed, geometry) =>
          save(
            {
              version: region.version,
              name: typed.name,
              timeZone: typed.timeZone,
              site: siteOf(typed),
              contacts: contactsOf(typed),
              shoreBufferKm: bufferOf(typed.shoreBufferKm) ?? 0,
              inland: typed.inland,
              ...(geometry === region.geometry ? {} : { geometry }),
            },
            geometry !== region.geometry,
          )
        }
      />
    </>
  )
}
