import { useQuery } from '@tanstack/react-query'
import type { Region } from '../../../shared/schemas/regions'
import type { RegionVersion } from '../../../shared/schemas/outlines'
import { regionVersionsQuery } from '../../api/regions'
import { Button } from '../../components/ui/button'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { dayWithYear } from '../../lib/dates'
import { grouped } from '../../lib/format'

interface Props {
  region: Region
  shown: number | null
  onShow: (version: RegionVersion | null) => void
}

/** Every version of the outline; an old one can be laid on the map. Nothing is said while there is only one. */
export function OutlineVersions({ region, shown, onShow }: Props) {
  const versions = useQuery({ ...regionVersionsQuery(region.id), enabled: region.geometryVersion > 1 })
  const items = versions.data?.items ?? []
  if (items.length < 2) return null
  return (
    <Table label="Versions of the outline">
      <thead>
        <tr>
          <Th>Version</Th>
          <Th>Drawn</Th>
          <Th figures>Area, km²</Th>
          <Th figures className="hidden tab:table-cell">Buffer, km</Th>
          <Th>
            <span className="heard">On the map</span>
          </Th>
        </tr>
      </thead>
      <tbody>
        {items.map((item) => (
          <Tr key={item.version}>
            <Td className="fig">{item.version}</Td>
            <Td>
              <span className="fig whitespace-nowrap">{dayWithYear(item.createdAt)}</span>
              {item.createdBy && <span className="block text-fine text-ink2">{item.createdBy}</span>}
            </Td>
            <Td figures>{grouped(Math.round(item.areaKm2))}</Td>
            <Td figures className="hidden tab:table-cell">{item.shoreBufferKm}</Td>
            <Td className="text-right">
              {item.inForce ? (
                <span className="text-ink2">in force</span>
              ) : (
                <Button kind="text" size="small" aria-pressed={shown === item.version} onClick={() => onShow(shown === item.version ? null : item)}>
                  {shown === item.version ? 'Take off' : 'Show'} <span className="heard">version {item.version}</span>
                </Button>
              )}
            </Td>
          </Tr>
        ))}
      </tbody>
    </Table>
  )
}
