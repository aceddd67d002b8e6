import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense } from 'react'
import { useParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Region } from '../../../shared/schemas/regions'
import { useCan } from '../../api/auth'
import { regionQuery } from '../../api/regions'
import { ButtonLink } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Message } from '../../components/ui/message'
import { Page } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { ContactsPart } from './contacts-part'
import { EventPart } from './event-part'
import { HistoryPart } from './history-part'
import { OutlinePart } from './outline-part'
import { RegionFigures } from './region-figures'
import { RegionStatement } from './region-statement'
import { RetireRegion } from './retire-region'
import { RulePart } from './rule-part'
import { SingleCellsPart } from './single-cells-part'
import { useCreatedRepairs } from './use-created-repairs'
import { ViewPart } from './view-part'

const SeriesPart = lazy(() => import('./series-part'))

export function Component() {
  const id = Number(useParams()['id'])
  const region = useQuery(regionQuery(id))
  return (
    <Page title={region.data?.name ?? 'Region'}>
      {region.isPending && <Waiting lines={5} />}
      {region.error && <Failure error={region.error} onRetry={() => void region.refetch()} />}
      {region.data && <RegionParts key={id} region={region.data} />}
    </Page>
  )
}

function RegionParts({ region }: { region: Region }) {
  const mayEdit = useCan('region:edit') && !region.retired
  const { progress, alertId } = region.standing
  const repairs = useCreatedRepairs()
  return (
    <>
      <RegionStatement
        region={region}
        actions={
          <>
            {mayEdit && <ButtonLink to={paths.editRegion.to({ id: region.id })}>Edit region</ButtonLink>}
            {alertId !== null && (
              <ButtonLink kind="filled" to={paths.alert.to({ id: alertId })}>
                Open alert {alertId}
              </ButtonLink>
            )}
          </>
        }
      />
      {region.retired && <Message title="This region is retired.">Its history stays; nothing new is judged or told.</Message>}
      {repairs.length > 0 && <Message title="The outline was put right as it was saved:">{repairs.join(' ')}</Message>}
      <HistoryPart region={region} />
      <RegionFigures standing={region.standing} />
      {region.standing.feedId !== null && progress === null && <SingleCellsPart regionId={region.id} feedId={region.standing.feedId} />}
      <Suspense fallback={<Waiting lines={6} />}>
        <SeriesPart region={region} />
      </Suspense>
      {region.standing.feedId !== null && progress === null && <ViewPart region={region} feedId={region.standing.feedId} />}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.5fr)_minmax(0,1fr)]">
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
          <EventPart regionId={region.id} feedId={region.standing.feedId} />
          <RulePart regionId={region.id} reading={progress !== null} />
        </div>
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-8">
          <OutlinePart region={region} />
          <ContactsPart region={region} />
        </div>
      </div>
      {mayEdit && <RetireRegion region={region} />}
    </>
  )
}
