import { useQuery } from '@tanstack/react-query'
import { paths } from '../../../shared/paths'
import { useCan } from '../../api/auth'
import { regionsQuery } from '../../api/regions'
import { ButtonLink } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { RegionTable } from './region-table'
import { regionCounts } from './region-counts'

export function Component() {
  const regions = useQuery(regionsQuery())
  const mayDraw = useCan('region:edit')
  const items = regions.data?.items ?? []
  const draw = mayDraw && (
    <>
      <ButtonLink to={paths.importRegions.to()}>Import</ButtonLink>
      <ButtonLink kind="filled" to={paths.newRegion.to()}>
        Draw a region
      </ButtonLink>
    </>
  )
  const counts = regionCounts(items)
  return (
    <Page title="Regions">
      <Statement worry={counts.worry} detail={counts.detail} actions={items.length > 0 && draw}>
        {counts.rest}
      </Statement>
      {regions.isPending && <Waiting lines={6} />}
      {regions.error && <Failure error={regions.error} onRetry={() => void regions.refetch()} />}
      {regions.isSuccess && items.length === 0 && (
        <Empty title="No region yet." action={draw}>
          {mayDraw ? 'Draw the water you answer for; its history is read at once.' : 'An analyst draws the water to be watched.'}
        </Empty>
      )}
      {items.length > 0 && <RegionTable regions={items} />}
      {items.length > 0 && (
        <p className="text-small text-ink2">
          <a className="link font-strong" href="/api/regions.geojson" download>
            All outlines as GeoJSON
          </a>
        </p>
      )}
    </Page>
  )
}
