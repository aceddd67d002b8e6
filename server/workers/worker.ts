import type { RefusalCode } from '../../shared/errors'
import { LayerRefused } from '../grids/layer-refused'
import { checkOutline } from './check-outline'
import { drawTile } from './draw-tile'
import { inspectFile } from './inspect-file'
import { judgeRegion } from './judge-region'
import { writeDemoFile } from '../seeders/demo/write-file'
import { comparePassword, hashPassword } from './password'
import { readCells } from './read-cells'
import { summariseViews } from './summarise-views'
import { surveyLayer } from './survey-layer'
import type { Tasks } from './tasks'
import { weighCells } from './weigh-cells'

export type Outcome<T> = { value: T } | { refused: { code: RefusalCode; message: string; facts: Record<string, unknown> } }

const handlers: { [K in keyof Tasks]: (input: Tasks[K]['input']) => Promise<Tasks[K]['output']> | Tasks[K]['output'] } = {
  hashPassword,
  comparePassword,
  inspectFile,
  weighCells,
  checkOutline,
  summariseViews,
  judgeRegion,
  drawTile,
  readCells,
  surveyLayer,
  writeDemoFile: ({ file, directory }) => writeDemoFile(file, directory),
}

/** One task of a worker thread. Faults other than refusals cross as they are. */
export default async function work<K extends keyof Tasks>(call: {
  task: K
  input: Tasks[K]['input']
}): Promise<Outcome<Tasks[K]['output']>> {
  try {
    return { value: await handlers[call.task](call.input) }
  } catch (error) {
    if (!(error instanceof LayerRefused)) throw error
    return { refused: { code: error.code, message: error.message, facts: error.facts } }
  }
}
