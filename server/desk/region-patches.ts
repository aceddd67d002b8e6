import type { z } from 'zod'
import { figureText, percentText } from '../../shared/figure-text'
import type { RegionPatches, patchesQuery } from '../../shared/schemas/patches'
import { dateOf, epochDayOf } from '../../shared/science/local-day'
import { defaultRule } from '../../shared/science/rule'
import type { Context } from '../context'
import { readable } from '../pipeline/layer-pictures'
import { storedView, usableDayBefore, type StoredFigures } from '../queries/stored-views'
import type { FoundPatches, PlacedPatch } from '../workers/patch-tasks'
import { levelText } from './region-level'
import { placeWords, viewSubject, type ViewSubject } from './view-subject'
import { patchesOfView } from './view-patches'

/** As many as a person reads; the others are counted. */
const mostListed = 40

const none = { patches: [], others: { patches: 0, cells: 0, areaKm2: 0 }, gone: [] }

/** The patches of one view of a region above a level, and what became of those of the usable view before. */
export async function regionPatches(context: Context, regionId: number, query: z.infer<typeof patchesQuery>): Promise<RegionPatches> {
  const subject = await viewSubject(context, regionId, query)
  const { geometry, feed, level } = subject
  const head = { regionId, feedId: feed.id, unit: feed.unit, level }
  const of = { geometryId: geometry.id, feedId: feed.id }
  const asked = query.day === undefined ? null : epochDayOf(query.day)
  const view = await storedView(context, of, asked)
  const noView = { ...head, ...none, answer: 'no view' as const, view: null, before: null, areaAboveKm2: null }
  if (!view) return { ...noView, sentence: asked === null ? 'This feed has no view of this region yet.' : `This feed has no view of this region on ${query.day}.` }
  const before = await viewBefore(context, subject, view.day)
  const wanted = { ...subject, level: level.level, minimumCells: query.minimumCells, most: mostListed }
  const found = await readable(patchesOfView(context, context.workers.light, wanted, view, before))
  if (!found) return { ...noView, sentence: 'The layers of this view have been deleted.' }
  return {
    ...head,
    ...answerOf(found, levelText(level.level, feed.unit), view),
    view: { day: dateOf(view.day), observedAt: new Date(view.observedAt).toISOString(), layerIds: view.layerIds, coverage: view.coverage },
    before: before && found.areaAboveBeforeKm2 !== null ? { day: dateOf(before.day), coverage: before.coverage, areaAboveKm2: found.areaAboveBeforeKm2 } : null,
    areaAboveKm2: found.areaAboveKm2,
    patches: found.patches.map(presentPatch),
    others: found.others,
    gone: found.gone.map(({ peak, ...patch }) => ({ ...patch, peak: placeWords(peak) })),
  }
}

async function viewBefore(context: Context, { geometry, feed, definition }: ViewSubject, day: number): Promise<StoredFigures | null> {
  const { coverageFloor, minimumWholeCells } = definition ?? defaultRule()
  const of = { geometryId: geometry.id, feedId: feed.id }
  const before = await usableDayBefore(context, of, day, { coverage: coverageFloor, wholeCells: minimumWholeCells })
  return before === null ? null : ((await storedView(context, of, before)) ?? null)
}

function answerOf({ seenCells, patches, others, areaAboveKm2 }: FoundPatches, level: string, { coverage }: StoredFigures): Pick<RegionPatches, 'answer' | 'sentence'> {
  if (seenCells === 0) return { answer: 'nothing seen', sentence: 'No water of this region was seen in this view.' }
  const seen = coverage === null ? 'what was seen' : `the ${percentText(coverage)} of the water that was seen`
  if (areaAboveKm2 === 0) return { answer: 'none above', sentence: `Nothing in ${seen} reaches ${level}.` }
  const count = patches.length + others.patches
  return { answer: 'patches', sentence: `${count === 1 ? 'One patch' : `${count} patches`} at or above ${level} in ${seen}, ${figureText(areaAboveKm2)} km² together.` }
}

function presentPatch({ peak, centre, outline, ...patch }: PlacedPatch, i: number): RegionPatches['patches'][number] {
  return {
    ...patch,
    number: i + 1,
    atLeast: patch.touchesEdge || patch.touchesUnseen,
    peak: placeWords(peak),
    centre: placeWords(centre),
    outline: { type: 'MultiLineString', coordinates: outline },
  }
}
