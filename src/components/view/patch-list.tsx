import { unitWords } from '../../../shared/figure-text'
import type { RegionPatches } from '../../../shared/schemas/patches'
import { threeDigits } from '../../lib/format'
import { Table, Td, Th, Tr } from '../ui/table'
import { beforeWords, changeWords, peakWords, sinceWord, squareKm, whereWords } from './patch-words'

interface Props {
  found: RegionPatches
  /** The patch marked on the map. */
  marked: number
  onMark: (number: number) => void
}

/** The patches of a view, the largest first, with the level they are above and what became of them. */
export function PatchList({ found, marked, onMark }: Props) {
  const { patches, others, unit, level, sentence } = found
  const hasSite = patches.some((patch) => patch.nearest)
  const open = patches.some((patch) => patch.atLeast)
  const before = beforeWords(found)
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-2">
      <p aria-live="polite">{sentence}</p>
      {patches.length > 0 && (
        <div className={patches.length > 8 ? 'max-h-112 overflow-y-auto border-b border-rule' : ''}>
          <Table label="Patches of this view">
            <thead>
              <tr>
                <Th>Patch</Th>
                <Th figures>Area, km²</Th>
                <Th figures>Greatest{unit && unit !== '1' && `, ${unitWords(unit)}`}</Th>
                <Th>{hasSite ? 'From the site' : 'Where'}</Th>
                {found.before && <Th className="hidden tab:table-cell">{sinceWord(found)}</Th>}
              </tr>
            </thead>
            <tbody>
              {patches.map((patch) => (
                <Tr key={patch.number}>
                  <Td>
                    <button
                      type="button"
                      aria-pressed={marked === patch.number}
                      aria-label={`Mark patch ${patch.number} on the map`}
                      className={`fig grid size-11 place-items-center border tab:size-8 ${marked === patch.number ? 'border-2 border-ink text-ink' : 'border-accent text-accent hover:text-accentDeep'}`}
                      onClick={() => onMark(patch.number)}
                    >
                      {patch.number}
                    </button>
                  </Td>
                  <Td figures className="whitespace-nowrap">
                    {patch.atLeast && <span className="mr-1 font-text text-fine text-ink2">at least</span>}
                    {threeDigits(patch.areaKm2)}
                  </Td>
                  <Td figures>{threeDigits(patch.greatest)}</Td>
                  <Td className="min-w-32">
                    <span className="fig">{whereWords(patch)}</span>
                    {peakWords(patch) && <span className="block text-fine text-ink2">{peakWords(patch)}</span>}
                    {patch.change && <span className="block text-fine tab:hidden">{changeWords(patch.change)}</span>}
                  </Td>
                  {found.before && <Td className="hidden min-w-36 tab:table-cell">{changeWords(patch.change)}</Td>}
                </Tr>
              ))}
            </tbody>
          </Table>
        </div>
      )}
      <div className="grid gap-1 text-small text-ink2">
        <p>
          Level: {level.why} Cells at or above it that meet at an edge or a corner are one patch.
          {hasSite && ' Distances go to the nearest cell.'}
          {open && ' At least: it touches the outline of the region or water that was not seen.'}
        </p>
        {others.patches > 0 && (
          <p>
            {others.patches} smaller not listed, {squareKm(others.areaKm2)} together.
          </p>
        )}
        {before && <p>{before}</p>}
      </div>
    </div>
  )
}
