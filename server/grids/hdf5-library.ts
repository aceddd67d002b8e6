import h5wasm, { Module } from 'h5wasm/node'
import { install_local_plugins } from 'h5wasm-plugins'

let ready: Promise<void> | null = null

/** The HDF5 library with its compression plugins, loaded once. */
export async function hdf5Library(): Promise<typeof h5wasm> {
  ready ??= h5wasm.ready.then((module) => install_local_plugins(module))
  await ready
  return h5wasm
}

/**
 * Runs reads or writes with errors thrown. Without this a failed read answers old memory as if it were data.
 * Opening files stays outside: the throwing handler loses a file descriptor at each failure.
 */
export function guarded<T>(work: () => T): T {
  Module.activate_throwing_error_handler()
  try {
    return work()
  } finally {
    Module.deactivate_throwing_error_handler()
  }
}
