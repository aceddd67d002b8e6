import type { GridWindow } from '../../shared/science/grid'
import { forgetSource, sourceOf } from './open-sources'
import type { LayerPlace } from './tasks'

/** The values of a layer in a window, NaN for missing. */
export async function readLayer(layer: LayerPlace, window: GridWindow): Promise<Float64Array> {
  const source = await sourceOf(layer.path, layer.fileName)
  try {
    return await source.readWindow(layer.variable, layer.step, window)
  } catch (error) {
    await forgetSource(layer.path)
    throw error
  }
}
