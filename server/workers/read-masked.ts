import { basename } from 'node:path'
import type { GridWindow } from '../../shared/science/grid'
import { reasonFilled } from '../../shared/science/kept-and-masked'
import { formulaOf } from '../../shared/science/optics/formulas'
import { cellsWith, type FlagMeaning } from '../grids/flags'
import type { GridSource, GridVariable } from '../grids/grid-source'
import { LayerRefused } from '../grids/layer-refused'
import { saysLogarithm } from '../grids/read/quantity'
import { unitFactor } from '../grids/unit-factor'
import { forgetSource, sourceOf } from './open-sources'
import type { LayerPlace, StoredValues, ValueReading } from './tasks'

/** Values of a window, NaN for missing, and which cells were hidden for which reason. */
export interface MaskedValues {
  values: Float64Array
  hidden: Map<string, Uint8Array>
}

/** A layer in a window, with the cells its feed hides made missing; a derived layer is worked out here, cell by cell. */
export async function readMasked(layer: LayerPlace, window: GridWindow): Promise<MaskedValues> {
  return layer.recipe ? derivedValues(layer.recipe, layer.reading, window) : storedValues(layer, layer.reading, window)
}

async function derivedValues({ formula: name, formulaVersion, bands }: NonNullable<LayerPlace['recipe']>, reading: ValueReading, window: GridWindow): Promise<MaskedValues> {
  const formula = formulaOf(name, formulaVersion)
  if (!formula || bands.length !== formula.bands.length) throw new Error(`There is no formula ${name}, version ${formulaVersion}, of ${bands.length} bands.`)
  const read: MaskedValues[] = []
  for (const [at, band] of bands.entries()) {
    const same = bands.findIndex((one) => one.path === band.path && one.variable === band.variable && one.step === band.step)
    read.push(same < at ? read[same]! : await storedValues(band, { ...reading, storedLog10: false, fileUnit: null }, window))
  }
  const nm = bands.map((band) => band.wavelengthNm)
  const values = Float64Array.from(read[0]!.values, (_, cell) => formula.value(read.map((band) => band.values[cell]!), nm))
  const hidden = new Map<string, Uint8Array>()
  for (const band of read) for (const [reason, cells] of band.hidden) hide(hidden, reason, cells)
  return { values, hidden }
}

async function storedValues(layer: StoredValues, reading: ValueReading, window: GridWindow): Promise<MaskedValues> {
  try {
    const source = await sourceOf(layer.path, layer.fileName)
    const variable = source.variables.find((one) => one.name === layer.variable)
    const values = await source.readWindow(layer.variable, layer.step, window)
    if (!variable) return { values, hidden: new Map() }
    convert(values, variable, reading)
    const hidden = await hiddenCells(source, variable, layer.step, reading, window)
    for (const cells of hidden.values()) for (let cell = 0; cell < values.length; cell++) if (cells[cell]) values[cell] = NaN
    return { values, hidden }
  } catch (error) {
    await forgetSource(layer.path)
    // A view is read from several files: the refusal says which of them it is about.
    throw error instanceof LayerRefused ? new LayerRefused(error.code, error.message, { ...error.facts, checksum: basename(layer.path) }, { cause: error.cause }) : error
  }
}

/** What the feed says of its numbers counts where the file itself says nothing. */
function convert(values: Float64Array, variable: GridVariable, { storedLog10, fileUnit, unit }: ValueReading): void {
  const isLog10 = storedLog10 && !saysLogarithm(variable)
  const factor = (variable.fileUnit === null && fileUnit !== null ? unitFactor(fileUnit, unit) : null) ?? 1
  if (!isLog10 && factor === 1) return
  for (let cell = 0; cell < values.length; cell++) values[cell] = (isLog10 ? 10 ** values[cell]! : values[cell]!) * factor
}

async function hiddenCells(source: GridSource, variable: GridVariable, step: number, { hiddenFlags }: ValueReading, window: GridWindow): Promise<Map<string, Uint8Array>> {
  const hidden = new Map<string, Uint8Array>()
  const { flags, gapFilled } = variable
  const wanted = flags?.meanings.filter((meaning) => hiddenFlags.includes(meaning.name)) ?? []
  await addHidden(flags?.variable ?? null, wanted, (meaning) => meaning.name)
  await addHidden(gapFilled?.variable ?? null, gapFilled?.meanings ?? [], () => reasonFilled)
  return hidden

  async function addHidden(flagVariable: string | null, meanings: readonly FlagMeaning[], reasonOf: (meaning: FlagMeaning) => string): Promise<void> {
    if (flagVariable === null || meanings.length === 0) return
    const cells = await source.readFlags(variable.name, step, window, flagVariable)
    for (const meaning of meanings) hide(hidden, reasonOf(meaning), cellsWith(cells, meaning))
  }
}

function hide(hidden: Map<string, Uint8Array>, reason: string, cells: Uint8Array): void {
  const before = hidden.get(reason)
  hidden.set(reason, before ? before.map((one, cell) => one | cells[cell]!) : cells)
}
