import { zodResolver } from '@hookform/resolvers/zod'
import { lazy, Suspense, useRef, useState } from 'react'
import { useForm, useWatch } from 'react-hook-form'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { polygonAreaKm2, ringAreaKm2 } from '../../../shared/science/ring-area'
import { sentenceOf } from '../../api/api-error'
import { fieldErrors } from '../../api/field-errors'
import { boundsAround } from '../map/bounds'
import type { MapBounds } from '../map/sea-map'
import { OutlineField } from '../outline/outline-field'
import { parsePosition } from '../outline/parse-position'
import { Button } from '../ui/button'
import { FaultMark } from '../ui/fault-mark'
import { CheckField, SelectField, TextField } from '../ui/field'
import { Message } from '../ui/message'
import { ContactFields } from './contact-fields'
import { OutlineHolds } from './outline-holds'
import { OutlineSize } from './outline-size'
import { bufferOf, positionText, regionFields, type RegionFields } from './region-fields'
import { TimeZoneField } from './time-zone-field'
import { useMeasured } from './use-measured'
import type { useDrawingGround } from './use-drawing-ground'

const DrawMap = lazy(() => import('../outline/draw-map'))

interface Props {
  id: string
  fields: RegionFields
  outline: RegionGeometry | null
  ground: ReturnType<typeof useDrawingGround>
  onFeed?: (feedId: number | undefined) => void
  onSave: (fields: RegionFields, outline: RegionGeometry) => void
  error: unknown
  /** Said beside the outline once it differs from the one saved. */
  redrawn?: string
}

/** Outline at the left, everything else about the region at the right. */
export function RegionForm({ id, fields, outline, ground, onFeed, onSave, error, redrawn }: Props) {
  const form = useForm<RegionFields>({ resolver: zodResolver(regionFields), defaultValues: fields })
  const [geometry, setGeometry] = useState(outline)
  const [drawing, setDrawing] = useState(outline === null)
  const [corners, setCorners] = useState<[number, number][]>([])
  const [siting, setSiting] = useState(false)
  const [bounds, setBounds] = useState<MapBounds>(() => (outline && boundsAround([outline], 0.5)) ?? ground.bounds)
  const [noOutline, setNoOutline] = useState(false)
  const mapPart = useRef<HTMLDivElement>(null)
  const site = parsePosition(useWatch({ control: form.control, name: 'sitePosition' }))
  const errors = form.formState.errors
  const refused = fieldErrors(error)
  const shoreBufferKm = bufferOf(useWatch({ control: form.control, name: 'shoreBufferKm' })) ?? 0
  const inland = useWatch({ control: form.control, name: 'inland' })
  const measured = useMeasured({ geometry, corners, drawing, shoreBufferKm, inland })
  const repairs = drawing ? [] : (measured.outline?.repairs ?? [])
  const shown = repairs.length > 0 ? measured.outline!.geometry : geometry
  const outlineProblem = measured.problem ?? (measured.outline ? undefined : refused['geometry']) ?? (noOutline && !geometry ? 'Draw the outline, or type it.' : undefined)
  const areaKm2 = drawing ? (corners.length >= 3 ? ringAreaKm2(corners) : null) : geometry ? polygonAreaKm2(geometry) : null

  function beginSiting() {
    setSiting(!siting)
    if (!siting) mapPart.current?.scrollIntoView({ block: 'center' })
  }

  const submit = form.handleSubmit(
    (typed) => (geometry ? onSave(typed, geometry) : setNoOutline(true)),
    () => setNoOutline(geometry === null),
  )

  return (
    <form id={id} noValidate onSubmit={(event) => void submit(event)} className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.5fr)_minmax(0,1fr)]">
      <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-4">
        <OutlineSize areaKm2={measured.problem === undefined ? areaKm2 : null} drawing={drawing} corners={corners.length} />
        {outlineProblem && (
          <p role="alert" className="flex items-start gap-2 text-small">
            <FaultMark /> {outlineProblem}
          </p>
        )}
        {(measured.allLand || inland) && <CheckField label="It is a lake or a narrow inlet" hint="Every cell in it then counts as water." {...form.register('inland')} />}
        {repairs.length > 0 && <Message title="It will be kept with this put right:">{repairs.join(' ')}</Message>}
        {redrawn !== undefined && geometry !== outline && !drawing && <Message>{redrawn}</Message>}
        <div ref={mapPart} className="grid grid-cols-[minmax(0,1fr)]">
          <Suspense fallback={<div className="hatch aspect-[1.2] opacity-60" />}>
            <DrawMap
              bounds={bounds}
              geometry={shown}
              repaired={drawing ? [] : measured.outline?.marks}
              fault={measured.place && { ...measured.place, about: measured.problem ?? '' }}
              drawing={drawing && !siting}
              onDrawing={(next) => {
                setCorners([])
                setDrawing(next)
              }}
              onGeometry={setGeometry}
              corners={corners.length}
              onCorners={setCorners}
              siting={siting}
              site={site}
              onSite={(position) => {
                form.setValue('sitePosition', positionText(position), { shouldValidate: true, shouldDirty: true })
                setSiting(false)
              }}
              others={ground.others}
              layerId={ground.layerId}
            />
          </Suspense>
        </div>
        <OutlineHolds feeds={measured.feeds} />
        <details>
          <summary className="link inline-flex min-h-11 items-center font-strong tab:min-h-0">Type or paste the outline</summary>
          <div className="mt-3">
            <OutlineField
              geometry={shown}
              onGeometry={(typed) => {
                setGeometry(typed)
                setDrawing(false)
                setBounds(boundsAround([typed], 0.5) ?? bounds)
              }}
            />
          </div>
        </details>
      </div>
      <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-5">
        <TextField label="Name" hint="Shown on map and in letters" autoComplete="off" error={errors.name?.message ?? refused['name']} {...form.register('name')} />
        {onFeed && ground.feeds.length > 0 && (
          <SelectField
            label="Watched feed"
            hint="Its first rule watches this feed."
            error={refused['feedId']}
            {...form.register('feedId', { onChange: (event: { target: { value: string } }) => onFeed(event.target.value ? Number(event.target.value) : undefined) })}
          >
            <option value="">the first chlorophyll feed that covers it</option>
            {ground.feeds.map((feed) => (
              <option key={feed.id} value={feed.id}>
                {feed.name}
              </option>
            ))}
          </SelectField>
        )}
        <TextField
          label="Shore buffer, km"
          hint="Cells whose centre is nearer to land than this take no part in any figure. Another buffer is another version of the outline."
          className="fig"
          inputMode="decimal"
          error={errors.shoreBufferKm?.message ?? refused['shoreBufferKm']}
          {...form.register('shoreBufferKm')}
        />
        <TimeZoneField error={errors.timeZone?.message ?? refused['timeZone']} {...form.register('timeZone')} />
        <fieldset className="grid gap-3 tab:grid-cols-2">
          <legend className="mb-1 text-small text-ink2">Site: the place distances are measured from</legend>
          <TextField label="What it is" placeholder="gear, intake, landing" error={errors.siteName?.message} {...form.register('siteName')} />
          <TextField label="Position" className="fig" placeholder="51.95, -10.70" error={errors.sitePosition?.message} {...form.register('sitePosition')} />
          <div className="tab:col-span-2">
            <Button kind="text" size="small" aria-pressed={siting} onClick={beginSiting}>
              {siting ? 'Tap the map where it is, or leave it' : 'Set it on the map'}
            </Button>
          </div>
        </fieldset>
        <ContactFields form={form} />
        {error !== null && error !== undefined && !refused['geometry'] && <Message fault>{sentenceOf(error)}</Message>}
      </div>
    </form>
  )
}
