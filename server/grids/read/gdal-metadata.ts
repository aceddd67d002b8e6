/** One item of GDAL's metadata tag; `sample` is null for items of the whole file. */
interface Item {
  name: string
  sample: number | null
  text: string
}

/** The items of GDAL's metadata tag: a flat list of <Item name="..." sample="...">text</Item>. */
export function gdalItems(xml: string): Item[] {
  return [...xml.matchAll(/<Item\b([^>]*)>([^<]*)<\/Item>/g)].flatMap(([, attributes = '', text = '']) => {
    const attribute = (name: string) => new RegExp(`\\b${name}\\s*=\\s*"([^"]*)"`).exec(attributes)?.[1]
    const name = attribute('name')
    const sample = attribute('sample')
    return name === undefined
      ? []
      : [{ name: unescape(name), sample: sample === undefined ? null : Number(sample), text: unescape(text) }]
  })
}

function unescape(text: string): string {
  return text
    .replace(/&#(x?)([0-9a-f]+);/gi, (whole, hex: string, digits: string) => {
      const code = parseInt(digits, hex ? 16 : 10)
      return code <= 0x10ffff ? String.fromCodePoint(code) : whole
    })
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&quot;', '"')
    .replaceAll('&apos;', "'")
    .replaceAll('&amp;', '&')
}
