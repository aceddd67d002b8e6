import fs from 'node:fs'
import { dirname } from 'node:path'
import type * as hdf5 from 'h5wasm/node'

type Library = typeof hdf5

let loading: Promise<Library> | null = null
let loaded: Library | null = null
let failures = 0
let pluginFolders: string[] = []

/** The HDF5 library with its compression plugins, loaded once and only when a NetCDF-4 file turns up. */
export function hdf5Library(): Promise<Library> {
  loading ??= load()
  return loading
}

async function load(): Promise<Library> {
  const [library, plugins] = await Promise.all([import('h5wasm/node'), import('h5wasm-plugins')])
  const ready = await library.ready
  plugins.install_local_plugins(ready)
  pluginFolders = ready.get_plugin_search_paths()
  loaded = library
  return library
}

/**
 * Runs reads or writes with errors thrown. Without this a failed read answers old memory as if it were data.
 * Opening files stays outside: the throwing handler loses a file descriptor at each failure. What is opened inside is
 * something the file's contents point at, and is refused: else a file sent by anybody could show any file of this machine.
 */
export function guarded<T>(work: () => T): T {
  if (!loaded) throw new Error('the HDF5 library is not loaded yet')
  loaded.Module.activate_throwing_error_handler()
  try {
    return confined(work)
  } catch (error) {
    failures += 1
    throw error
  } finally {
    loaded.Module.deactivate_throwing_error_handler()
  }
}

const newFile = fs.constants.O_CREAT | fs.constants.O_EXCL

/** Data that lie in another file: external storage, external links, virtual datasets. */
export class PointsElsewhere extends Error {
  override name = 'PointsElsewhere'
  constructor(readonly path: string) {
    super(`points at ${path}`)
  }
}

/** The library answers fill values, without an error, where another file cannot be opened: so it is told here. */
function confined<T>(work: () => T): T {
  const { openSync } = fs
  let elsewhere: string | null = null
  fs.openSync = (path, flags, mode) => {
    const ofPlugins = pluginFolders.some((folder) => path === folder || dirname(String(path)) === folder)
    // Its error messages go through a new file of their own, which can hold nothing yet.
    const isNew = typeof flags === 'number' && (flags & newFile) === newFile
    if (ofPlugins || isNew) return openSync(path, flags, mode)
    elsewhere ??= String(path)
    throw Object.assign(new Error(`EACCES: permission denied, open '${String(path)}'`), { code: 'EACCES', errno: -13, syscall: 'open' })
  }
  let answer: T
  try {
    answer = work()
  } catch (error) {
    throw elsewhere === null ? error : new PointsElsewhere(elsewhere)
  } finally {
    fs.openSync = openSync
  }
  if (elsewhere !== null) throw new PointsElsewhere(elsewhere)
  return answer
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
