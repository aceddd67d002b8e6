import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense, useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { OffingFile } from '../../../shared/schemas/files'
import { feedsQuery } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { SectionHead } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { dayWithYear } from '../../lib/dates'

const LayerLook = lazy(() => import('./layer-look'))
const atFirst = 12

/** The layers this file gave, and one of them as a picture. */
export function LayersPart({ file }: { file: OffingFile }) {
  const feeds = useQuery(feedsQuery()).data?.items
  const [chosen, setChosen] = useState<number>()
  const [all, setAll] = useState(false)
  if (file.layers.length === 0) return null
  const newest = file.layers[file.layers.length - 1]
  const shownId = chosen ?? newest?.id
  const shown = all ? file.layers : file.layers.slice(-atFirst)
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-6 desk:grid-cols-[minmax(0,1fr)_minmax(0,1.2fr)]">
      <section className="grid grid-cols-[minmax(0,1fr)] content-start gap-2">
        <SectionHead count={file.layers.length} ruled={false}>
          Layers
        </SectionHead>
        <Table label="Layers of this file">
          <thead>
            <tr>
              <Th>Observed</Th>
              <Th>Feed</Th>
              <Th>
                <span className="heard">Show</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {shown.map((layer) => (
              <Tr key={layer.id}>
                <Td className="fig whitespace-nowrap">{dayWithYear(layer.observedAt)}</Td>
                <Td>
                  <Link className="link" to={paths.feed.to({ id: layer.feedId })}>
                    {feeds?.find((feed) => feed.id === layer.feedId)?.name ?? `feed ${layer.feedId}`}
                  </Link>
                  {layer.replaced && <span className="block text-fine text-ink2">replaced by a newer file</span>}
                </Td>
                <Td className="text-right">
                  {layer.id === shownId ? (
                    <span className="font-strong">shown</span>
                  ) : (
                    <Button kind="text" size="small" onClick={() => setChosen(layer.id)}>
                      Show
                    </Button>
                  )}
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
        {file.layers.length > atFirst && !all && (
          <div>
            <Button kind="text" size="small" onClick={() => setAll(true)}>
              Show all {file.layers.length}
            </Button>
          </div>
        )}
      </section>
      {shownId !== undefined && (
        <Suspense fallback={<div className="hatch aspect-[1.2] opacity-60" />}>
          <LayerLook layerId={shownId} />
        </Suspense>
      )}
    </div>
  )
}
