import type { GridWindow } from '../../shared/science/grid'
import { readMasked } from './read-masked'
import type { LayerPlace } from './tasks'

/** The values of a layer in a window, NaN for missing and for what its feed hides. */
export async function readLayer(layer: LayerPlace, window: GridWindow): Promise<Float64Array> {
  return (await readMasked(layer, window)).values
}
