import type { RefusalCode } from '../../shared/errors'
import { hdf5Failures } from '../grids/hdf5-library'
import { LayerRefused } from '../grids/layer-refused'
import { checkOutline } from './check-outline'
import { composeMask } from './compose-mask'
import { countCells, findLandMarks } from './count-cells'
import { drawMaskTile } from './draw-mask-tile'
import { drawTile } from './draw-tile'
import { findPatches } from './find-patches'
import { inspectFile } from './inspect-file'
import { measureOutline } from './measure-outline'
import { judgeRegion } from './judge-region'
import { writeDemoFile } from '../seeders/demo/write-file'
import { comparePassword, hashPassword } from './password'
import { readCells } from './read-cells'
import { packFigures } from './packed-figures'
import { decodeLayers } from './read-tiles'
import { summariseViews } from './summarise-views'
import { surveyLayer } from './survey-layer'
import { readAreas } from './read-areas'
import type { Tasks } from './tasks'
import { readView } from './view-cells'
import { weighCells } from './weigh-cells'

/** Errors lose their class between threads: a refusal crosses as data. `spent`: this thread should do no further task. */
export type Outcome<T> = ({ value: T } | { refused: { code: RefusalCode; message: string; facts: Record<string, unknown> } } | { fault: unknown }) & { spent: boolean }

const handlers: { [K in keyof Tasks]: (input: Tasks[K]['input']) => Promise<Tasks[K]['output']> | Tasks[K]['output'] } = {
  greet: () => true,
  hashPassword,
  comparePassword,
  inspectFile,
  weighCells,
  checkOutline,
  measureOutline,
  readAreas,
  summariseViews: async (input) => packFigures(await summariseViews(input)),
  decodeLayers,
  judgeRegion,
  drawTile,
  readCells,
  surveyLayer,
  findLandMarks,
  countCells,
  composeMask,
  drawMaskTile,
  findPatches,
  readView: ({ layers, weights, reading }) => readView(layers, weights, reading),
  writeDemoFile: ({ file, directory }) => writeDemoFile(file, directory),
}

/** One task of a worker thread. Faults other than refusals are answered as they are, and leave the thread in doubt. */
export default async function work<K extends keyof Tasks>(call: {
  task: K
  input: Tasks[K]['input']
}): Promise<Outcome<Tasks[K]['output']>> {
  const before = hdf5Failures()
  const spent = () => hdf5Failures() > before
  try {
    const value = await handlers[call.task](call.input)
    return { value, spent: spent() }
  } catch (error) {
    if (!(error instanceof LayerRefused)) return { fault: error, spent: true }
    return { refused: { code: error.code, message: error.message, facts: error.facts }, spent: spent() }
  }
}
