import type { GridWindow } from '../../shared/science/grid'
import type { ValidRange } from './picture-tasks'
import { readWindow } from './read-window'
import type { LayerPlace } from './tasks'
import { withinRange } from './valid-range'

/** The values of a layer in a window; NaN for missing, for what its feed hides and for what lies outside its valid range. */
export async function readLayer(layer: LayerPlace, range: ValidRange, window: GridWindow): Promise<Float64Array> {
  return withinRange(await readWindow(layer, window), range).values
}
