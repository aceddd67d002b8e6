import { AreaFileRefused } from '../geography/import/area-file'
import { readAreas as read } from '../geography/import/read-areas'
import { checkOutline } from './check-outline'
import type { OutlineTasks } from './outline-tasks'

/** What a file holds, each area checked as if it were drawn. */
export async function readAreas({ bytes, fileName, inland }: OutlineTasks['readAreas']['input']): Promise<OutlineTasks['readAreas']['output']> {
  try {
    const { format, notes, areas } = await read(Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength), fileName)
    return {
      format,
      notes,
      areas: areas.map(({ name, geometry, repairs = [] }) => {
        const outcome = checkOutline({ sent: geometry, inland })
        return { name, outcome: 'outline' in outcome ? { outline: { ...outcome.outline, repairs: [...repairs, ...outcome.outline.repairs] } } : outcome }
      }),
    }
  } catch (error) {
    if (!(error instanceof AreaFileRefused)) throw error
    return { refusedFile: error.message }
  }
}
