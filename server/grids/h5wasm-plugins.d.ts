declare module 'h5wasm-plugins' {
  import type { H5Module } from 'h5wasm/src/hdf5_util_helpers.js'

  export function install_local_plugins(module: H5Module): void
}
