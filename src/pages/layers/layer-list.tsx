import { useInfiniteQuery, useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Layer } from '../../../shared/schemas/layers'
import { feedsQuery } from '../../api/feeds'
import { layersQuery } from '../../api/layers'
import { Button } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { SelectField, TextField } from '../../components/ui/field'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { mapLink } from '../layer-map/map-address'
import { layerTime } from './layer-time'

/** Layers newest first, of one feed or of all. */
export function LayerList({ feedId: fixed }: { feedId?: number }) {
  const [chosen, setChosen] = useState('')
  const [from, setFrom] = useState('')
  const [to, setTo] = useState('')
  const feeds = useQuery(feedsQuery()).data?.items ?? []
  const feedId = fixed ?? (chosen === '' ? undefined : Number(chosen))
  const layers = useInfiniteQuery(layersQuery({ feedId, from: from || undefined, to: to || undefined }))
  const items = layers.data?.pages.flatMap((page) => page.items) ?? []
  return (
    <>
      <div className="grid max-w-3xl gap-4 tab:grid-cols-3">
        {fixed === undefined && (
          <SelectField label="Feed" value={chosen} onChange={(event) => setChosen(event.target.value)}>
            <option value="">all feeds</option>
            {feeds.map((feed) => (
              <option key={feed.id} value={feed.id}>
                {feed.name}
              </option>
            ))}
          </SelectField>
        )}
        <TextField type="date" label="From" value={from} onChange={(event) => setFrom(event.target.value)} />
        <TextField type="date" label="To" value={to} onChange={(event) => setTo(event.target.value)} />
      </div>
      {layers.isPending && <Waiting lines={5} />}
      {layers.error && <Failure error={layers.error} onRetry={() => void layers.refetch()} />}
      {layers.isSuccess && items.length === 0 && <Empty title="No layer of these days.">Layers appear as soon as a file has been read.</Empty>}
      {items.length > 0 && (
        <Table label="Layers">
          <thead>
            <tr>
              <Th>Observed, UTC</Th>
              <Th>Variable</Th>
              <Th className="hidden tab:table-cell">Stage</Th>
              <Th className="hidden tab:table-cell">Version</Th>
              <Th figures className="hidden desk:table-cell">
                Grid
              </Th>
              <Th>File</Th>
            </tr>
          </thead>
          <tbody>
            {items.map((layer) => (
              <LayerRow key={layer.id} layer={layer} />
            ))}
          </tbody>
        </Table>
      )}
      {layers.hasNextPage && (
        <div>
          <Button kind="text" disabled={layers.isFetchingNextPage} onClick={() => void layers.fetchNextPage()}>
            Older layers
          </Button>
        </div>
      )}
    </>
  )
}

function LayerRow({ layer }: { layer: Layer }) {
  return (
    <Tr>
      <Td className="fig whitespace-nowrap">
        <Link className="link" title="On the map" to={mapLink({ feedId: layer.feedId, day: layer.observedAt.slice(0, 10), layerId: layer.id })}>
          {layerTime(layer)}
        </Link>
      </Td>
      <Td>
        <span className="fig">{layer.variable}</span>
        {layer.suspect && (
          <span className="block text-fine text-ink2">
            marked suspect by {layer.suspect.by}
            {layer.suspect.note && `: ${layer.suspect.note}`}
          </span>
        )}
        {layer.replacedBy != null && (
          <span className="block text-fine text-ink2">
            replaced by a{' '}
            <Link className="link" to={paths.file.to({ id: layer.replacedBy })}>
              newer file
            </Link>
          </span>
        )}
      </Td>
      <Td className="hidden tab:table-cell">{layer.stage}</Td>
      <Td className="fig hidden tab:table-cell">{layer.processingVersion}</Td>
      <Td figures className="hidden desk:table-cell">
        {layer.grid.columns} × {layer.grid.rows}
      </Td>
      <Td className="max-w-[40vw]">
        <Link className="link fig break-all" to={paths.file.to({ id: layer.fileId })}>
          {layer.fileName}
        </Link>
      </Td>
    </Tr>
  )
}
