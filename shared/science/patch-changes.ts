import type { Patches } from './patches'

export const patchChangeKinds = ['new', 'grown', 'shrunk', 'steady', 'joined', 'parted', 'joined and parted', 'not seen before', 'gone', 'not seen now'] as const
export type PatchChangeKind = (typeof patchChangeKinds)[number]

/** Patches of two views that overlap, directly or through each other. */
export interface PatchFamily {
  kind: PatchChangeKind
  /** Places in the lists of patches. */
  before: number[]
  now: number[]
  beforeKm2: number
  nowKm2: number
}

/** A change of less than this share of the area before is none. */
export const steadyShare = 0.05

export interface SeenPatches extends Patches {
  values: Float64Array
}

/**
 * What became of the patches of the view before, by overlap. `beforeAt` says for each cell now where it lies in the lists
 * of the view before (-1: nowhere), `weightKm2` weighs the cells now. One with one is grown, shrunk or (within 5 %)
 * steady; several with one joined; one with several parted; several with several both. Without a partner a patch is new
 * or gone, unless more than half of its water was not seen in the other view: then nobody knows. Every patch is in one
 * family, so the changes of all families add up to the change of the whole area.
 */
export function patchChanges(before: SeenPatches, now: SeenPatches, beforeAt: Int32Array, weightKm2: Float64Array): PatchFamily[] {
  const first = before.patches.length
  const parent = Int32Array.from({ length: first + now.patches.length }, (_, i) => i)
  const rootOf = (i: number): number => {
    while (parent[i] !== i) i = parent[i] = parent[parent[i]!]!
    return i
  }
  const [unseenBefore, unseenNow, mappedBefore] = [new Float64Array(now.patches.length), new Float64Array(first), new Float64Array(first)]
  for (let i = 0; i < beforeAt.length; i++) {
    const j = beforeAt[i]!
    const [then, here] = [j < 0 ? -1 : before.labels[j]!, now.labels[i]!]
    if (then >= 0) mappedBefore[then]! += weightKm2[i]!
    if (then >= 0 && here >= 0) parent[rootOf(then)] = rootOf(first + here)
    else if (here >= 0 && (j < 0 || !Number.isFinite(before.values[j]))) unseenBefore[here]! += weightKm2[i]!
    else if (then >= 0 && !Number.isFinite(now.values[i])) unseenNow[then]! += weightKm2[i]!
  }
  const families = new Map<number, PatchFamily>()
  const familyOf = (i: number): PatchFamily => {
    const root = rootOf(i)
    const family = families.get(root) ?? { kind: 'steady', before: [], now: [], beforeKm2: 0, nowKm2: 0 }
    families.set(root, family)
    return family
  }
  // In the order of the patches now, the largest first; those that are gone at the end.
  for (const [at, patch] of now.patches.entries()) {
    const family = familyOf(first + at)
    family.now.push(at)
    family.nowKm2 += patch.areaKm2
  }
  for (const [at, patch] of before.patches.entries()) {
    const family = familyOf(at)
    family.before.push(at)
    family.beforeKm2 += patch.areaKm2
  }
  const isUnseenBefore = (at: number) => unseenBefore[at]! > now.patches[at]!.areaKm2 / 2
  const isUnseenNow = (at: number) => unseenNow[at]! > mappedBefore[at]! / 2
  return [...families.values()].map((family) => ({ ...family, kind: kindOf(family, isUnseenBefore, isUnseenNow) }))
}

function kindOf({ before, now, beforeKm2, nowKm2 }: PatchFamily, isUnseenBefore: (at: number) => boolean, isUnseenNow: (at: number) => boolean): PatchChangeKind {
  if (before.length === 0) return isUnseenBefore(now[0]!) ? 'not seen before' : 'new'
  if (now.length === 0) return isUnseenNow(before[0]!) ? 'not seen now' : 'gone'
  if (before.length > 1) return now.length > 1 ? 'joined and parted' : 'joined'
  if (now.length > 1) return 'parted'
  if (Math.abs(nowKm2 - beforeKm2) < steadyShare * beforeKm2) return 'steady'
  return nowKm2 > beforeKm2 ? 'grown' : 'shrunk'
}
