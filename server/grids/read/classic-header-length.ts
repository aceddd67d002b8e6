const dimensionTag = 10
const variableTag = 11
const attributeTag = 12
const longestItem = 4 * 1024 * 1024
const mostItems = 100_000
const elementBytes = [0, 1, 1, 2, 4, 4, 8]

/** A header that contradicts itself, as opposed to one that goes on beyond the bytes at hand. */
export class BrokenHeader extends Error {}

/** Bytes at hand end before the header does. */
export class HeaderGoesOn extends Error {}

/**
 * Length of a CDF-1 or CDF-2 header, found by walking over it without building anything. The parser that follows
 * allocates whatever counts a header names, so a few wrong bytes could cost it gigabytes; this walk costs nothing.
 * Source: NetCDF classic format specification.
 */
export function classicHeaderLength(bytes: Buffer): number {
  let at = 4
  const skip = (length: number) => {
    if (length > longestItem) throw new BrokenHeader(`something in it is ${length} bytes long`)
    at += Math.ceil(length / 4) * 4
  }
  const int = (): number => {
    if (at + 4 > bytes.length) throw new HeaderGoesOn()
    at += 4
    return bytes.readUInt32BE(at - 4)
  }
  const name = () => skip(int())
  const list = (tag: number, item: () => void) => {
    const found = int()
    const count = int()
    if (found !== tag && (found !== 0 || count !== 0)) throw new BrokenHeader(`a list begins with ${found}`)
    if (count > mostItems) throw new BrokenHeader(`a list declares ${count} items`)
    for (let i = 0; i < count; i++) item()
  }
  const typed = (): number => {
    const size = elementBytes[int()]
    if (!size) throw new BrokenHeader('it names an unknown type')
    return size
  }
  const attribute = () => {
    name()
    const size = typed()
    skip(int() * size)
  }
  int()
  list(dimensionTag, () => {
    name()
    int()
  })
  list(attributeTag, attribute)
  list(variableTag, () => {
    name()
    skip(int() * 4)
    list(attributeTag, attribute)
    typed()
    int()
    if (bytes[3] === 2) int()
    int()
  })
  if (at > bytes.length) throw new HeaderGoesOn()
  return at
}
