import { useState } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import type { GridMasks, WaterMaskShown } from '../../../shared/schemas/masks'
import { useCan } from '../../api/auth'
import { Button } from '../../components/ui/button'
import { periodWords, maskName } from './mask-words'
import { PutInForce } from './put-in-force'

interface Props {
  feed: Pick<Feed, 'id' | 'name' | 'retired'>
  grid: GridMasks
  inForce: WaterMaskShown
  shown: WaterMaskShown
  onShow: (id: number) => void
}

/** Every version, newest first: each can be looked at, and put in force by who may change feeds. */
export function MaskVersions({ feed, grid, inForce, shown, onShow }: Props) {
  const mayForce = useCan('feed:edit') && !feed.retired
  const [chosen, setChosen] = useState<WaterMaskShown>()
  if (grid.masks.length < 2) return null
  return (
    <>
      <ul aria-label="Versions of the water mask" className="border-t border-rule text-small">
        {grid.masks.map((mask) => (
          <li key={mask.id} className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1 border-b border-rule py-2">
            <span className="min-w-0">
              <span className={mask.inForce ? 'font-strong' : ''}>{maskName(mask)}</span>
              <span className="block text-fine text-ink2">{[mask.inForce ? 'in force' : '', periodWords(mask)].filter(Boolean).join(', ')}</span>
            </span>
            <span className="flex flex-wrap gap-2">
              <Button kind="text" size="small" aria-label={`Show ${maskName(mask)}`} aria-pressed={mask.id === shown.id} onClick={() => onShow(mask.id)}>
                {mask.id === shown.id ? 'Shown' : 'Show'}
              </Button>
              {mayForce && !mask.inForce && (
                <Button size="small" aria-label={`Put ${maskName(mask)} in force…`} onClick={() => setChosen(mask)}>
                  {mask.version < inForce.version ? 'Go back to it…' : 'Put in force…'}
                </Button>
              )}
            </span>
          </li>
        ))}
      </ul>
      {chosen && <PutInForce feed={feed} mask={chosen} inForce={inForce} onDone={() => setChosen(undefined)} />}
    </>
  )
}
