import type { Context } from '../context'
import type { Transaction } from '../db'
import type { FeedRecord } from '../models/feed'
import type { RegionCellWeights, ViewFigures, ViewTask } from '../workers/tasks'
import { compareVersions } from '../../shared/science/merge-views'
import { trustedLayers, type PlacedLayer } from '../queries/layers'
import { writeSummaries, type SummaryRow } from '../queries/summaries'
import { cellCentre } from '../grids/cell-centre'
import { figuresInHalves } from './figures-in-halves'
import { gridOf } from './known-grids'
import { placeOf } from './layer-place'
import { maskedWeights, maskInForce, maskNamed, noteWholeWater, type KnownMask } from './masks/mask-in-force'
import { provenanceFor } from './provenance'
import { layersOfDays, viewDay } from './view-day'

export interface ViewKey {
  geometryId: number
  feedId: number
  day: number
}

interface View extends ViewKey {
  layers: PlacedLayer[]
  gridId: number
}

/** Figures that are worked out and wait to be written. */
export interface MadeViews {
  rows: SummaryRow[]
  /** Views that have lost all their layers, and go. */
  empty: ViewKey[]
}

/**
 * Makes the named views anew from the trusted layers they hold now, and writes their figures in one transaction,
 * together with whatever `alongside` writes. A view that has lost all its layers is removed.
 */
export async function summariseViews(
  context: Context,
  keys: readonly ViewKey[],
  alongside: (tx: Transaction) => Promise<void> = async () => undefined,
): Promise<void> {
  await keepViews(context, await makeViews(context, keys), alongside)
}

export async function makeViews(context: Context, keys: readonly ViewKey[]): Promise<MadeViews> {
  const made: MadeViews = { rows: [], empty: [] }
  for (const [feedId, ofFeed] of groupBy(keys, (key) => key.feedId)) {
    const feed = await context.models.feeds.findByPk(feedId, { rejectOnEmpty: true })
    const views = await viewsOf(context, feedId, ofFeed)
    made.empty.push(...views.filter((view) => view.layers.length === 0))
    made.rows.push(...(await figuresOf(context, feed, views.filter((view) => view.layers.length > 0))))
  }
  return made
}

export async function keepViews(context: Context, { rows, empty }: MadeViews, alongside: (tx: Transaction) => Promise<void>): Promise<void> {
  await context.db.write(async (tx) => {
    await writeSummaries(context, tx, rows, empty)
    await alongside(tx)
  })
}

/**
 * The figures of one view read anew from its stored files, nothing written; null when no trusted layer is left. By the
 * water mask that is named, as an alert's evidence does, though another may be in force by now; else by that in force.
 */
export async function freshFigures(context: Context, key: ViewKey, waterMask?: string): Promise<(ViewFigures & { checksum: string }) | null> {
  const feed = await context.models.feeds.findByPk(key.feedId, { rejectOnEmpty: true })
  const [view] = await viewsOf(context, key.feedId, [key])
  if (!view || view.layers.length === 0) return null
  const mask = waterMask === undefined ? null : await maskNamed(context, key.feedId, view.gridId, waterMask)
  const [row] = await figuresOf(context, feed, [view], 'the original', mask)
  return row ? { ...row.figures, checksum: view.layers[0]!.checksum } : null
}

/** The layers of each view, all on one grid: that of the latest processing version. */
async function viewsOf(context: Context, feedId: number, keys: readonly ViewKey[]): Promise<View[]> {
  const { from, to } = layersOfDays(keys.map((key) => key.day))
  const layers = await trustedLayers(context, feedId, from, to)
  const geometries = new Map(
    (await context.models.geometries.findAll({ where: { id: [...new Set(keys.map((key) => key.geometryId))] }, attributes: ['id', 'centreLongitude'] })).map(
      (geometry) => [geometry.id, geometry.centreLongitude],
    ),
  )
  const byPlace = new Map<number, Map<number, PlacedLayer[]>>()
  for (const [geometryId, longitude] of geometries) {
    byPlace.set(geometryId, groupBy(layers, (layer) => viewDay(layer, longitude)))
  }
  return keys.map((key) => {
    const all = byPlace.get(key.geometryId)?.get(key.day) ?? []
    const latest = all.reduce<PlacedLayer | null>((a, b) => (a && compareVersions(a.processingVersion, b.processingVersion) >= 0 ? a : b), null)
    return { ...key, gridId: latest?.gridId ?? 0, layers: all.filter((layer) => layer.gridId === latest?.gridId) }
  })
}

async function figuresOf(context: Context, feed: FeedRecord, views: readonly View[], from: 'anywhere' | 'the original' = 'anywhere', named: KnownMask | null = null): Promise<SummaryRow[]> {
  if (views.length === 0) return []
  const layers = [...new Map(views.flatMap((view) => view.layers).map((layer) => [layer.id, layer])).values()]
  const places = new Map(layers.map((layer, at) => [layer.id, at]))
  const weights: RegionCellWeights[] = []
  const weightsAt = new Map<string, number>()
  const tasks: ViewTask[] = []
  // Asked once, so that the figures and what they say they rest on are of one mask.
  const masks = new Map<number, KnownMask>()
  for (const gridId of new Set(views.map((view) => view.gridId))) masks.set(gridId, named ?? (await maskInForce(context, feed.id, gridId)))
  for (const view of views) {
    const name = `${view.geometryId}:${view.gridId}`
    if (!weightsAt.has(name)) {
      weightsAt.set(name, weights.length)
      const mask = masks.get(view.gridId)!
      const masked = await maskedWeights(context, view.geometryId, mask, view.layers[0]!)
      await noteWholeWater(context, view.geometryId, mask, masked)
      weights.push(masked)
    }
    tasks.push({ layers: view.layers.map((layer) => places.get(layer.id)!), weights: weightsAt.get(name)! })
  }
  const touched = views.map((view) => weights[weightsAt.get(`${view.geometryId}:${view.gridId}`)!]!.index.length > 0)
  const kept = views.filter((_, i) => touched[i])
  const figures = await figuresInHalves(context, {
    layers: layers.map((layer) => placeOf(context, layer, from)),
    weights,
    views: tasks.filter((_, i) => touched[i]),
    scale: feed.scale,
    validMin: feed.validMin,
    validMax: feed.validMax,
  })
  return rowsOf(context, kept, figures, masks)
}

async function rowsOf(context: Context, views: readonly View[], figures: readonly ViewFigures[], masks: ReadonlyMap<number, KnownMask>): Promise<SummaryRow[]> {
  const rows: SummaryRow[] = []
  const provenances = new Map<string, number>()
  for (const [i, view] of views.entries()) {
    const first = view.layers[0]!
    const maskId = masks.get(view.gridId)!.id
    const processingVersion = view.layers.map((layer) => layer.processingVersion).reduce((a, b) => (compareVersions(a, b) >= 0 ? a : b))
    const { maxCell } = figures[i]!
    const [maxLon, maxLat] = maxCell === null ? [null, null] : cellCentre(await gridOf(context, view.gridId), maxCell)
    const formula = recipeText(first.recipe)
    const kind = `${view.gridId}:${maskId}:${processingVersion}:${formula}`
    const provenanceId = provenances.get(kind) ?? (await provenanceFor(context, { gridId: view.gridId, maskId, processingVersion, formula }))
    provenances.set(kind, provenanceId)
    rows.push({
      geometryId: view.geometryId,
      feedId: view.feedId,
      day: view.day,
      figures: figures[i]!,
      maxLat,
      maxLon,
      layerIds: view.layers.map((layer) => layer.id),
      observedAt: first.observedAt,
      endsAt: view.layers.reduce<number | null>((end, layer) => (layer.endsAt === null ? end : Math.max(end ?? 0, layer.endsAt)), null),
      provenanceId,
    })
  }
  return rows
}

/** Formula, version and bands of a derived layer, as its figures are traced by. */
function recipeText(recipe: PlacedLayer['recipe']): string | null {
  if (!recipe) return null
  return `${recipe.formula}, version ${recipe.formulaVersion}, of ${[...new Set(recipe.bands.map((band) => band.variable))].join(', ')}`
}

function groupBy<T, K>(items: readonly T[], keyOf: (item: T) => K): Map<K, T[]> {
  const groups = new Map<K, T[]>()
  for (const item of items) {
    const group = groups.get(keyOf(item))
    if (group) group.push(item)
    else groups.set(keyOf(item), [item])
  }
  return groups
}
