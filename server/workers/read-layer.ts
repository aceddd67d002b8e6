import type { GridWindow } from '../../shared/science/grid'
import { formulaOf } from '../../shared/science/optics/formulas'
import { forgetSource, sourceOf } from './open-sources'
import type { LayerPlace, StoredValues } from './tasks'

/** The values of a layer in a window, NaN for missing; those of a derived layer are worked out here, cell by cell. */
export async function readLayer(layer: LayerPlace, window: GridWindow): Promise<Float64Array> {
  return layer.recipe ? derivedValues(layer.recipe, window) : storedValues(layer, window)
}

async function derivedValues({ formula: name, formulaVersion, bands }: NonNullable<LayerPlace['recipe']>, window: GridWindow): Promise<Float64Array> {
  const formula = formulaOf(name, formulaVersion)
  if (!formula || bands.length !== formula.bands.length) throw new Error(`There is no formula ${name}, version ${formulaVersion}, of ${bands.length} bands.`)
  const read: Float64Array[] = []
  for (const [at, band] of bands.entries()) {
    const same = bands.findIndex((one) => one.path === band.path && one.variable === band.variable && one.step === band.step)
    read.push(same < at ? read[same]! : await storedValues(band, window))
  }
  const nm = bands.map((band) => band.wavelengthNm)
  return Float64Array.from(read[0]!, (_, cell) => formula.value(read.map((values) => values[cell]!), nm))
}

async function storedValues(layer: StoredValues, window: GridWindow): Promise<Float64Array> {
  const source = await sourceOf(layer.path, layer.fileName)
  try {
    return await source.readWindow(layer.variable, layer.step, window)
  } catch (error) {
    await forgetSource(layer.path)
    throw error
  }
}
