import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { cellWeights } from '../../server/pipeline/cell-weights'
import type { RegionRecord } from '../../server/models/region'
import { ratio, report } from './measured'
import { openOffing } from './offing'
import { referenceRegions, referenceSeconds } from './reference'
import { shapes } from './shapes'

/** New regions over ten years of daily layers of 300 x 300, written to the database; ingest of the same layers. */
const fields = process.argv[2]!
const turns = 5
const box = { west: -14, east: -2, south: 44, north: 56, least: 0.4, most: 0.9 }
const files = Array.from({ length: 10 }, (_, year) => join(fields, `year-${year}.nc`))
const folder = mkdtempSync(join(tmpdir(), 'offing-bench-history-'))
const offing = await openOffing()
try {
  const ingest: number[] = []
  const reading: number[] = []
  for (const file of files) {
    await offing.send(file)
    ingest.push((await offing.work())['process-file']!)
    reading.push(referenceSeconds(folder, { files: [file], variable: 'chlor_a', regions: [] }, 'read'))
  }
  const [one, oneByReference] = await drawn(1, 100)
  const [many, manyByReference] = await drawn(20, 200)
  report([
    ratio('a new region over 3,650 daily layers of 300 x 300', one, oneByReference, 0.2),
    ratio('20 new regions in one pass over them', many, manyByReference, 0.2),
    ratio('ingest of a year of them with all it writes, over merely reading', ingest, reading, 1.5),
  ])
} finally {
  await offing.close()
  rmSync(folder, { recursive: true, force: true })
}

/** Seconds until the figures of new regions are committed, and those of the reference, by turns. */
async function drawn(count: number, seed: number): Promise<[ours: number[], reference: number[]]> {
  const [ours, reference]: [number[], number[]] = [[], []]
  for (let turn = -1; turn < turns; turn++) {
    const regions = await offing.draw(shapes(count, box, seed + turn))
    const seconds = (await offing.work())['backfill-region']!
    const theirs = referenceSeconds(folder, { files, variable: 'chlor_a', regions: referenceRegions(await weightsOf(regions)) })
    // The first turn warms up both sides.
    if (turn < 0) continue
    ours.push(seconds)
    reference.push(theirs)
  }
  return [ours, reference]
}

async function weightsOf(regions: readonly RegionRecord[]) {
  return Promise.all(regions.map((region) => cellWeights(offing.context, region.geometryId!, 1, { rows: 300, columns: 300 })))
}
