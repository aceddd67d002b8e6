import type { FoundAttributes } from '../../shared/schemas/found'

const mostItems = 100
const longest = 500
/** Of all attributes of a file together, in characters. */
const mostText = 100_000

/** Attributes as text for people: a bounded number of them, each cut where it is long. One keeper a file. */
export class AttributeKeeper {
  private left = mostText

  keep(attributes: Readonly<Record<string, string | number | number[]>>): FoundAttributes {
    const all = Object.entries(attributes)
    const items: FoundAttributes['items'] = []
    for (const [name, value] of all.slice(0, mostItems)) {
      if (this.left <= 0) break
      const text = typeof value === 'string' ? value : numbersAsText(value)
      const item = { name: name.slice(0, 200), value: text.slice(0, longest), length: text.length > longest ? text.length : null }
      this.left -= item.name.length + item.value.length
      items.push(item)
    }
    return { items, leftOut: all.length - items.length }
  }
}

function numbersAsText(value: number | number[]): string {
  return typeof value === 'number' ? String(value) : value.join(', ')
}
