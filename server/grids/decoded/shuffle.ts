/** Bytes of equal rank put side by side, as HDF5's shuffle filter does: all first bytes, then all second bytes. */
export function shuffled(bytes: Uint8Array, width: number): Uint8Array {
  const count = bytes.length / width
  const out = new Uint8Array(bytes.length)
  for (let rank = 0; rank < width; rank++) {
    const plane = rank * count
    for (let i = 0, at = rank; i < count; i++, at += width) out[plane + i] = bytes[at]!
  }
  return out
}

/** The reverse of `shuffled`, in a buffer of its own. */
export function unshuffled(bytes: Uint8Array, width: number): Uint8Array {
  const count = Math.floor(bytes.length / width)
  const out = new Uint8Array(bytes.length)
  for (let rank = 0; rank < width; rank++) {
    const plane = rank * count
    for (let i = 0, at = rank; i < count; i++, at += width) out[at] = bytes[plane + i]!
  }
  // Bytes that fill no whole number stand at the end as they are.
  out.set(bytes.subarray(count * width), count * width)
  return out
}
