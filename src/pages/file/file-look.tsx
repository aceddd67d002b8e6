import { useQuery } from '@tanstack/react-query'
import { TileLayer } from 'react-leaflet'
import { colouringOf, colouringOfSpread, type ColouredFeed } from '../../../shared/colouring'
import { unitWords } from '../../../shared/figure-text'
import { endpoints } from '../../../shared/schemas/endpoints'
import type { OffingFile, ReportVariable } from '../../../shared/schemas/files'
import { regionsQuery } from '../../api/regions'
import { LegendScale } from '../../components/map/legend-scale'
import { cellPane } from '../../components/map/panes'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap, type MapBounds } from '../../components/map/sea-map'
import { HatchTile } from '../../components/ui/hatch-pattern'
import { SectionHead } from '../../components/ui/page'
import { useTheme } from '../../hooks/use-theme'
import { dayWithYear } from '../../lib/dates'

interface Props {
  file: OffingFile
  variable: ReportVariable
  hiddenFlags: readonly string[]
}

/** The first step as it would be read, before anything is confirmed: what is ticked as hidden shows as missing. */
export default function FileLook({ file, variable, hiddenFlags }: Props) {
  const regions = useQuery(regionsQuery()).data?.items.filter((region) => !region.retired) ?? []
  const { grid, times, name, unit, histogram } = variable
  const bounds: MapBounds = [
    [Math.max(-84, grid.south), grid.west],
    [Math.min(84, grid.north), grid.east],
  ]
  const feed: ColouredFeed =
    [file.proposal, ...file.others].find((one) => one?.variable === name) ?? { quantity: 'other', variable: name, unit, scale: 'linear', validMin: null, validMax: null }
  const colouring = colouringOf(feed) ?? colouringOfSpread(feed, histogram ?? null)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] content-start gap-2">
      <SectionHead ruled={false} aside={<span className="fig">{stepWords(variable)}</span>}>
        Quick look
      </SectionHead>
      <SeaMap key={name} label={`First step of ${name}${times.first ? `, ${dayWithYear(times.first)}` : ''}`} bounds={bounds} hatched aspect={1.25}>
        <FileTiles fileId={file.id} variable={name} hiddenFlags={hiddenFlags} />
        <RegionOutlines regions={regions.map(({ id, name: title, geometry, standing }) => ({ id, name: title, geometry, state: standing.state }))} />
      </SeaMap>
      <div className="pl-11 tab:pl-13">
        <div className="mx-[7px]">
          <LegendScale colouring={colouring} legend={undefined} />
          <p className="mt-1 flex flex-wrap justify-between gap-x-6 gap-y-1 text-small text-ink2">
            <span>
              <b className="fig font-heading text-ink">{name}</b>
              {unit && `, ${unitWords(unit)}`}
              {colouring.scale !== 'screen' && `, ${colouring.scale === 'log' ? 'logarithmic' : 'linear'}`}
            </span>
            <span>
              <HatchTile />
              missing or hidden
            </span>
          </p>
        </div>
      </div>
    </section>
  )
}

function FileTiles({ fileId, variable, hiddenFlags }: { fileId: number; variable: string; hiddenFlags: readonly string[] }) {
  const theme = useTheme()
  const path = endpoints.fileTile.path.replace(':id', String(fileId)).replace(':z', '{z}').replace(':x', '{x}').replace(':y', '{y}')
  const query = new URLSearchParams({ variable, hidden: hiddenFlags.join(' '), theme })
  const url = `/api${path}?${query.toString()}`
  return <TileLayer key={url} url={url} pane={cellPane} className="map-cells" maxNativeZoom={14} keepBuffer={1} />
}

function stepWords({ times }: ReportVariable): string {
  const step = times.count > 1 ? `step 1 of ${times.count}` : 'the only step'
  return times.first ? `${dayWithYear(times.first)}, ${step}` : step
}
