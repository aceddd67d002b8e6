import type { Dataset, File } from 'h5wasm'
import { guarded, hdf5Library } from '../hdf5-library'
import { type AttributeInput, checkShape, defaultFill, encodeTimes, type GridFile, packValues } from './grid-file'

const elementTypes = { i2: '<h', f4: '<f', u1: '<B' } as const

/** Writes a NetCDF-4 file (CF-1.8) that the usual tools read: dimension scales, one chunk a time step. */
export async function writeNetcdf4(path: string, file: GridFile): Promise<void> {
  checkShape(file)
  const library = await hdf5Library()
  const target = new library.File(path, 'w', { track_order: true, libver: ['v108', 'v110'] })
  if (target.file_id < 0n) throw new Error(`cannot write ${path}`)
  try {
    guarded(() => writeContent(target, file))
  } finally {
    target.close()
  }
}

function writeContent(target: File, file: GridFile): void {
  const [rows, columns, steps] = [file.latitudes.length, file.longitudes.length, file.times.length]
  const times = encodeTimes(file)
  setAttributes(target, { Conventions: 'CF-1.8', ...file.globalAttributes })

  const axis = (name: string, dimension: number, values: Float64Array, attributes: Record<string, string>) => {
    const growing = name === 'time'
    const dataset = target.create_dataset({
      name,
      data: values,
      dtype: '<d',
      shape: [values.length],
      maxshape: [growing ? null : values.length],
      chunks: growing ? [Math.min(values.length, 4096)] : null,
      track_order: true,
    })
    dataset.make_scale(name)
    dataset.create_attribute('_Netcdf4Dimid', dimension, [], '<i')
    setAttributes(dataset, attributes)
  }
  axis('time', 0, times.values, {
    standard_name: 'time',
    units: times.units,
    calendar: 'standard',
    axis: 'T',
    ...(times.bounds ? { bounds: 'time_bnds' } : {}),
  })
  axis('lat', 1, Float64Array.from(file.latitudes), {
    standard_name: 'latitude',
    long_name: 'latitude',
    units: 'degrees_north',
    axis: 'Y',
  })
  axis('lon', 2, Float64Array.from(file.longitudes), {
    standard_name: 'longitude',
    long_name: 'longitude',
    units: 'degrees_east',
    axis: 'X',
  })
  if (times.bounds) writeTimeBounds(target, times.bounds, steps)

  for (const variable of file.variables) {
    const { dtype, fill = defaultFill[dtype] } = variable
    const dataset = target.create_dataset({
      name: variable.name,
      data: packValues(variable),
      dtype: elementTypes[dtype],
      shape: [steps, rows, columns],
      maxshape: [null, rows, columns],
      chunks: [1, rows, columns],
      ...(file.deflate ? { compression: file.deflate } : {}),
      track_order: true,
    })
    const element = { i2: Int16Array, f4: Float32Array, u1: Uint8Array }[dtype]
    dataset.create_attribute('_FillValue', element.of(fill), [1])
    if (variable.scale !== undefined) dataset.create_attribute('scale_factor', Float64Array.of(variable.scale), [1])
    if (variable.offset !== undefined) dataset.create_attribute('add_offset', Float64Array.of(variable.offset), [1])
    setAttributes(dataset, variable.attributes ?? {})
    for (const [index, name] of ['time', 'lat', 'lon'].entries()) dataset.attach_scale(index, `/${name}`)
  }
}

function writeTimeBounds(target: File, bounds: Float64Array, steps: number): void {
  // A dimension without a variable of its own is written as netCDF does it, under the name its readers look for.
  const pair = target.create_dataset({ name: 'nv', data: new Float32Array(2), shape: [2], track_order: true })
  pair.make_scale('This is a netCDF dimension but not a netCDF variable.         2')
  pair.create_attribute('_Netcdf4Dimid', 3, [], '<i')
  const dataset = target.create_dataset({
    name: 'time_bnds',
    data: bounds,
    shape: [steps, 2],
    maxshape: [null, 2],
    chunks: [Math.min(steps, 4096), 2],
    track_order: true,
  })
  dataset.attach_scale(0, '/time')
  dataset.attach_scale(1, '/nv')
}

function setAttributes(target: File | Dataset, attributes: Record<string, AttributeInput>): void {
  for (const [name, value] of Object.entries(attributes)) {
    if (typeof value === 'number') target.create_attribute(name, Float64Array.of(value), [1])
    else if (value !== '') target.create_attribute(name, value, [], `S${Buffer.byteLength(value)}`)
  }
}
