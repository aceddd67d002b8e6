/** Bytes of equal rank put side by side, as HDF5's shuffle filter does: all first bytes, then all second bytes. */
export function shuffled(bytes: Uint8Array, width: number): Uint8Array {
  const count = Math.floor(bytes.length / width)
  const out = new Uint8Array(bytes.length)
  for (let rank = 0; rank < width; rank++) {
    const plane = rank * count
    for (let i = 0, at = rank; i < count; i++, at += width) out[plane + i] = bytes[at]!
  }
  out.set(bytes.subarray(count * width), count * width)
  return out
}

/** The reverse of `shuffled`, in a buffer of its own. Bytes that fill no whole number stand at the end as they are. */
export function unshuffled(bytes: Uint8Array, width: number): Uint8Array {
  const count = Math.floor(bytes.length / width)
  const out = new Uint8Array(bytes.length)
  out.set(bytes.subarray(count * width), count * width)
  // Whole numbers at a time are three times as fast as bytes; typed arrays have the machine's order, little-endian where Node runs.
  if (width === 4) fourByFour(bytes, new Uint32Array(out.buffer, 0, count))
  else {
    for (let rank = 0; rank < width; rank++) {
      const plane = rank * count
      for (let i = 0, at = rank; i < count; i++, at += width) out[at] = bytes[plane + i]!
    }
  }
  return out
}

function fourByFour(bytes: Uint8Array, out: Uint32Array): void {
  const count = out.length
  const [second, third, fourth] = [count, 2 * count, 3 * count]
  for (let i = 0; i < count; i++) out[i] = bytes[i]! | (bytes[second + i]! << 8) | (bytes[third + i]! << 16) | (bytes[fourth + i]! << 24)
}
