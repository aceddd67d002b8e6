import { useQuery } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import { unitWords } from '../../../shared/figure-text'
import { paths } from '../../../shared/paths'
import type { Layer, LayerPoint } from '../../../shared/schemas/layers'
import { layerLegendQuery, layerPointQuery } from '../../api/layers'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Figure } from '../../components/ui/figure'
import { SectionHead } from '../../components/ui/page'
import { figure, timesUsual } from '../../lib/format'
import { layerTime } from '../layers/layer-time'
import { cellBounds, cellMiddle, usualWords, yesOrNo } from './cell-words'
import type { Place } from './map-address'

interface Props {
  layer: Layer | undefined
  at: Place | undefined
  onForget: () => void
}

/** The cell somebody pointed at: its value, what is usual there, where and when it was seen, and by which file. */
export function CellReadout({ layer, at, onForget }: Props) {
  return (
    <section aria-label="Cell" className="grid content-start gap-3">
      <SectionHead
        aside={
          at && (
            <Button kind="text" size="small" onClick={onForget}>
              Let go of the cell
            </Button>
          )
        }
      >
        One cell
      </SectionHead>
      {!at && <p className="text-ink2">Click the map to read a cell. By keyboard: the arrows move the map, Enter reads the cell under the cross.</p>}
      {at && !layer && <p className="text-ink2">There is no layer on this day; the place is kept for the next.</p>}
      {at && layer && <Readout layer={layer} at={at} />}
    </section>
  )
}

function Readout({ layer, at }: { layer: Layer; at: Place }) {
  const point = useQuery(layerPointQuery(layer.id, at, false))
  const usual = useQuery(layerPointQuery(layer.id, at, true))
  const screen = useQuery(layerLegendQuery(layer.id)).data?.colouring.scale === 'screen'
  if (point.error) return <Failure error={point.error} onRetry={() => void point.refetch()} />
  const read = point.data
  if (!read) return <p className="text-ink2">Reading the cell</p>
  if (read.row === null) return <p aria-live="polite">This place lies outside the layer.</p>
  const unit = read.unit && read.unit !== '1' ? unitWords(read.unit) : ''
  return (
    <>
      <div aria-live="polite" className="flex flex-wrap gap-x-10 gap-y-3">
        {read.value === null ? (
          <div>
            <div className="text-small text-ink2">Value</div>
            <div className="text-title">missing</div>
            <div className="text-fine text-ink2">not seen on this day</div>
          </div>
        ) : (
          <Figure label="Value" value={figure(read.value)} unit={screen ? yesOrNo(read.value) : unit} />
        )}
        <Usual value={screen ? null : read.value} unit={screen ? yesOrNo(usual.data?.usual?.median ?? null) : unit} usual={usual.data?.usual} failed={usual.isError} day={layer.observedAt} />
      </div>
      <dl className="grid grid-cols-[7rem_minmax(0,1fr)] gap-x-4 gap-y-1.5 border-t border-rule pt-3 text-small">
        <Fact name="Middle">{cellMiddle(read)}</Fact>
        <Fact name="Bounds">{cellBounds(read)}</Fact>
        <Fact name="In the grid">
          row {read.row}, column {read.column} of {layer.grid.rows} × {layer.grid.columns}
        </Fact>
        <Fact name={layer.endsAt ? 'Period' : 'Seen'}>{layerTime(layer)}{layer.hasClock && !layer.endsAt && ' UTC'}</Fact>
        <Fact name="Variable">
          {layer.variable}, version {layer.processingVersion}
          {layer.derived && `; worked out by ${layer.derived.formula}, version ${layer.derived.formulaVersion}`}
        </Fact>
        <Fact name="Layer and file">
          {layer.id}, <Link className="link inline-flex min-h-11 items-center break-all tab:min-h-0" to={paths.file.to({ id: layer.fileId })}>{layer.fileName}</Link>
        </Fact>
      </dl>
    </>
  )
}

function Usual({ value, unit, usual, failed, day }: { value: number | null; unit: string; usual: LayerPoint['usual'] | undefined; failed: boolean; day: string }) {
  if (failed) return <p className="text-small text-ink2">What is usual here could not be read.</p>
  if (!usual) return <p className="text-small text-ink2">Reading earlier years</p>
  const median = usual.median
  const times = value !== null && median !== null && value > 0 && median > 0 ? value / median : undefined
  return (
    <div>
      <div className="text-small text-ink2">Usual here</div>
      {median === null ? (
        <div className="text-body">{usual.yearsWithLayers === 0 ? 'no earlier years' : 'not seen in earlier years'}</div>
      ) : (
        <div className="text-title">
          <span className="fig">{figure(median)}</span>
          {unit && <span className="ml-1 text-body font-text">{unit}</span>}
          {times !== undefined && <span className="ml-4 text-body font-text">{timesUsual(times)} times usual</span>}
        </div>
      )}
      <div className="max-w-80 text-fine text-ink2">{usualWords(usual, day)}</div>
    </div>
  )
}

function Fact({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <>
      <dt className="text-ink2">{name}</dt>
      <dd className="fig min-w-0">{children}</dd>
    </>
  )
}
