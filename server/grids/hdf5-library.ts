import fs from 'node:fs'
import type * as hdf5 from 'h5wasm/node'

type Library = typeof hdf5

let loading: Promise<Library> | null = null
let loaded: Library | null = null
let failures = 0

/** The HDF5 library with its compression plugins, loaded once and only when a NetCDF-4 file turns up. */
export function hdf5Library(): Promise<Library> {
  loading ??= load()
  return loading
}

async function load(): Promise<Library> {
  const [library, plugins] = await Promise.all([import('h5wasm/node'), import('h5wasm-plugins')])
  plugins.install_local_plugins(await library.ready)
  loaded = library
  return library
}

/**
 * Runs reads or writes with errors thrown. Without this a failed read answers old memory as if it were data.
 * Opening files stays outside: the throwing handler loses a file descriptor at each failure.
 */
export function guarded<T>(work: () => T): T {
  if (!loaded) throw new Error('the HDF5 library is not loaded yet')
  loaded.Module.activate_throwing_error_handler()
  try {
    return work()
  } catch (error) {
    failures += 1
    throw error
  } finally {
    loaded.Module.deactivate_throwing_error_handler()
  }
}

/** How often the library has failed in this thread. Each failure leaves a file descriptor behind that only the thread's end gives back. */
export function hdf5Failures(): number {
  return failures
}

/**
 * Runs an opening without the pages the library writes to the error output when it fails: the caller says it in a
 * sentence. The library writes through Node's file functions, which are put back before anything else runs.
 */
export function quietly<T>(work: () => T): T {
  const { writeSync } = fs
  const silent = (descriptor: number, data: string | NodeJS.ArrayBufferView, ...rest: unknown[]): number =>
    descriptor === 2
      ? typeof data === 'string' ? data.length : typeof rest[1] === 'number' ? rest[1] : data.byteLength
      : (writeSync as (...all: unknown[]) => number)(descriptor, data, ...rest)
  fs.writeSync = silent as typeof fs.writeSync
  try {
    return work()
  } finally {
    fs.writeSync = writeSync
  }
}
