import type { SingleCells } from '../../shared/schemas/outlines'
import { dateOf } from '../../shared/science/local-day'
import { wholeShare } from '../../shared/science/region-outline'
import { fewestWholeCells, wholeWaterCells } from '../../shared/science/whole-water'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { cellCentre } from '../grids/cell-centre'
import { gridOf } from '../pipeline/known-grids'
import { maskedWeights, maskInForce } from '../pipeline/masks/mask-in-force'
import { rangeOf, readable } from '../pipeline/layer-pictures'
import { placeOf } from '../pipeline/layer-place'
import { layersById } from '../queries/layers'
import { newestView } from '../queries/newest-view'

/** More than these are no few cells, however little of each lies inside. */
const mostCells = 100

/**
 * A region with fewer whole water cells than percentiles need is shown cell by cell: those of its newest view in a feed,
 * merged from its layers as for its figures. `few` false: it has enough, and no cells are read.
 */
export async function singleCells(context: Context, regionId: number, feedId: number): Promise<SingleCells> {
  const region = await context.models.regions.findByPk(regionId)
  const feed = await context.models.feeds.findByPk(feedId)
  if (!region?.geometryId || !feed) throw new ApiError('not-found', 'There is no such region or feed.')
  const view = await newestView(context, region.geometryId, feedId)
  const layers = view ? await layersById(context, view.layerIds) : []
  const [first] = layers
  if (!view || !first) return { few: false, wholeCells: null, day: null, unit: feed.unit, cells: [] }
  const mask = await maskInForce(context, feedId, first.gridId)
  const weights = await maskedWeights(context, region.geometryId, mask, first)
  const wholeCells = wholeWaterCells(weights)
  const head = { wholeCells, day: dateOf(view.day), unit: feed.unit }
  if (wholeCells >= fewestWholeCells || weights.index.length > mostCells) return { few: wholeCells < fewestWholeCells, ...head, cells: [] }
  const reading = { ...rangeOf(feed), scale: feed.scale }
  const values = await readable(context.workers.light('readView', { layers: layers.map((layer) => placeOf(context, layer)), weights, reading }))
  const grid = await gridOf(context, first.gridId)
  const cells = Array.from(weights.index, (cell, i) => {
    const [longitude, latitude] = cellCentre(grid, cell)
    const share = weights.share[i]!
    return { longitude, latitude, share, whole: share >= wholeShare, water: weights.water[i] === 1, value: Number.isFinite(values[i]) ? values[i]! : null }
  })
  return { few: true, ...head, cells }
}
