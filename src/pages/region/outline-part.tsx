import { lazy, Suspense, useState } from 'react'
import type { RegionVersion } from '../../../shared/schemas/outlines'
import type { Region } from '../../../shared/schemas/regions'
import { outlineHref, outlineKmlHref } from '../../api/regions'
import { SectionHead } from '../../components/ui/page'
import { dayWithYear } from '../../lib/dates'
import { degrees, grouped } from '../../lib/format'
import { OutlineVersions } from './outline-versions'

const OutlineMap = lazy(() => import('./outline-map'))

/** Where it lies: map, area, version of the outline, site. */
export function OutlinePart({ region }: { region: Region }) {
  const [old, setOld] = useState<RegionVersion | null>(null)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHead ruled={false}>Outline</SectionHead>
      <Suspense fallback={<div className="hatch aspect-[1.15] opacity-60" />}>
        <OutlineMap region={region} old={old?.geometry ?? null} />
      </Suspense>
      {old && (
        <p className="text-small text-ink2" aria-live="polite">
          Dotted: version <span className="fig">{old.version}</span>, as it was until it was redrawn.
        </p>
      )}
      <dl className="grid grid-cols-[auto_minmax(0,1fr)] text-small [&>dd]:border-b [&>dd]:border-rule [&>dd]:py-2 [&>dt]:border-b [&>dt]:border-rule [&>dt]:py-2 [&>dt]:pr-6 [&>dt]:text-ink2">
        <dt>Area</dt>
        <dd className="fig">{grouped(Math.round(region.areaKm2))} km²</dd>
        <dt>Outline</dt>
        <dd>
          version <span className="fig">{region.geometryVersion}</span>
        </dd>
        <dt>Shore buffer</dt>
        <dd>{region.shoreBufferKm > 0 ? <span className="fig">{region.shoreBufferKm} km</span> : 'none'}</dd>
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
      <OutlineVersions region={region} shown={old?.version ?? null} onShow={setOld} />
      <p className="flex flex-wrap gap-x-5 text-small text-ink2" data-no-print>
        <a className="link inline-flex min-h-11 items-center font-strong tab:min-h-0" href={outlineHref(region.id, old?.version ?? region.geometryVersion)} download>
          {old ? `Version ${old.version}` : 'Outline'} as GeoJSON
        </a>
        <a className="link inline-flex min-h-11 items-center font-strong tab:min-h-0" href={outlineKmlHref(region.id, old?.version ?? region.geometryVersion)} download>
          as KML
        </a>
      </p>
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
