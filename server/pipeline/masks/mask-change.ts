import type { MaskChange } from '../../../shared/schemas/masks'
import { ApiError } from '../../api-error'
import type { Context } from '../../context'
import { activeGeometries } from '../../queries/geometries'
import { maskById, restingOn } from '../../queries/masks'
import type { RegionCellWeights } from '../../workers/tasks'
import { gridOf } from '../known-grids'
import { maskedWeights, maskInForce } from './mask-in-force'

/** What putting a mask in force would change. Regions nothing was read for on its grid have no figures to change. */
export async function maskChangeOf(context: Context, id: number): Promise<MaskChange> {
  const mask = await maskById(context, id)
  const feed = mask && (await context.models.feeds.findByPk(mask.feedId))
  if (!mask || !feed) throw new ApiError('not-found', 'There is no such water mask.')
  const now = await maskInForce(context, feed.id, mask.gridId)
  const size = await gridOf(context, mask.gridId)
  const weighed = await context.db.all<{ geometryId: number; name: string }>(
    'SELECT w.geometry_id AS geometryId, r.name FROM cell_weights w JOIN regions r ON r.geometry_id = w.geometry_id WHERE w.grid_id = $gridId AND w.cells > 0',
    { gridId: mask.gridId },
  )
  const names = new Map(weighed.map(({ geometryId, name }) => [geometryId, name]))
  const regions: MaskChange['regions'] = []
  for (const geometry of await activeGeometries(context)) {
    const name = names.get(geometry.id)
    if (name === undefined) continue
    const before = await maskedWeights(context, geometry.id, now, size)
    const after = await maskedWeights(context, geometry.id, mask, size)
    if (Buffer.compare(countedAs(before), countedAs(after)) === 0) continue
    regions.push({ id: geometry.regionId, name, waterKm2Now: waterKm2(before), waterKm2Then: waterKm2(after), allThen: !after.water.includes(1) })
  }
  return { maskId: id, insteadOf: now.id, regions, ...(await restingOn(context, feed.id, mask.gridId)), freshnessLimitHours: feed.freshnessLimitHours }
}

/** A mask without any water here is no mask: every cell counts. */
function countedAs({ water }: RegionCellWeights): Uint8Array {
  return water.includes(1) ? water : new Uint8Array(water.length).fill(1)
}

function waterKm2(weights: RegionCellWeights): number {
  return countedAs(weights).reduce((sum, is, i) => sum + is * weights.share[i]! * weights.areaKm2[i]!, weights.outsideWaterKm2)
}
