import { lazy, Suspense } from 'react'
import type { Region } from '../../../shared/schemas/regions'
import { SectionHead } from '../../components/ui/page'
import { dayWithYear } from '../../lib/dates'
import { degrees, grouped } from '../../lib/format'

const OutlineMap = lazy(() => import('./outline-map'))

/** Where it lies: map, area, version of the outline, site. */
export function OutlinePart({ region }: { region: Region }) {
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHead ruled={false}>Outline</SectionHead>
      <Suspense fallback={<div className="hatch aspect-[1.15] opacity-60" />}>
        <OutlineMap region={region} />
      </Suspense>
      <dl className="grid grid-cols-[auto_minmax(0,1fr)] text-small [&>dd]:border-b [&>dd]:border-rule [&>dd]:py-2 [&>dt]:border-b [&>dt]:border-rule [&>dt]:py-2 [&>dt]:pr-6 [&>dt]:text-ink2">
        <dt>Area</dt>
        <dd className="fig">{grouped(Math.round(region.areaKm2))} km²</dd>
        <dt>Outline</dt>
        <dd>
          version <span className="fig">{region.geometryVersion}</span>
        </dd>
        <dt>Site</dt>
        <dd>{region.site ? <SiteWords site={region.site} /> : 'none set'}</dd>
        <dt>Time zone</dt>
        <dd>{region.timeZone}</dd>
        <dt>Drawn</dt>
        <dd>
          <span className="fig">{dayWithYear(region.createdAt)}</span>
          {region.createdBy && `, ${region.createdBy}`}
        </dd>
      </dl>
    </section>
  )
}

function SiteWords({ site }: { site: NonNullable<Region['site']> }) {
  return (
    <>
      {site.name && `${site.name}, `}
      <span className="fig">
        {degrees(site.latitude, 'latitude')} {degrees(site.longitude, 'longitude')}
      </span>
    </>
  )
}
