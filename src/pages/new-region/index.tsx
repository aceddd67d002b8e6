import { useState } from 'react'
import { Link, useNavigate } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { useCreateRegion } from '../../api/regions'
import { blankFields, bufferOf, contactsOf, siteOf } from '../../components/region-form/region-fields'
import { RegionForm } from '../../components/region-form/region-form'
import { SaveButton } from '../../components/region-form/save-button'
import { useDrawingGround } from '../../components/region-form/use-drawing-ground'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'

const formId = 'new-region'

export function Component() {
  const [feedId, setFeedId] = useState<number>()
  const [fields] = useState(blankFields)
  const ground = useDrawingGround(feedId, undefined)
  const [begun, setBegun] = useState(false)
  if (ground.ready && !begun) setBegun(true)
  const create = useCreateRegion()
  const navigate = useNavigate()
  return (
    <Page title="Draw a region">
      <Statement
        above={
          <Link className="link font-strong" to={paths.regions.to()}>
            Regions
          </Link>
        }
        detail="When it is saved its history is read at once, from every layer kept."
        actions={
          <SaveButton form={formId} disabled={create.isPending || !begun}>
            Save the region
          </SaveButton>
        }
      >
        Draw the water you answer for.
      </Statement>
      {!begun && <Waiting lines={6} />}
      {begun && (
        <RegionForm
          id={formId}
          fields={fields}
          outline={null}
          ground={ground}
          onFeed={setFeedId}
          error={create.error}
          onSave={(typed, geometry) =>
            create.mutate(
              {
                name: typed.name,
                geometry,
                timeZone: typed.timeZone,
                site: siteOf(typed),
                contacts: contactsOf(typed),
                shoreBufferKm: bufferOf(typed.shoreBufferKm) ?? 0,
                inland: typed.inland,
                ...(typed.feedId === '' ? {} : { feedId: Number(typed.feedId) }),
              },
              { onSuccess: (region) => void navigate(paths.region.to({ id: region.id }), { state: { repairs: region.repairs } }) },
            )
          }
        />
      )}
    </Page>
  )
}
