import { kml } from '@tmcw/togeojson'
import { DOMParser } from '@xmldom/xmldom'
import { areasOfFeatures } from './areas-of-geojson'
import { AreaFileRefused, type AreaFile } from './area-file'

const deepest = 100

/**
 * Areas of a KML text. Document types are refused before anything is parsed, so there are no entities to expand and
 * nothing outside the file is ever fetched.
 */
export function areasOfKml(text: string, fileName: string): AreaFile {
  if (/<!(DOCTYPE|ENTITY)/i.test(text)) throw new AreaFileRefused('The file declares a document type or entities. KML needs none, and they are not read: take the declaration out.')
  if (depthOf(text) > deepest) throw new AreaFileRefused(`The elements of this file are nested more than ${deepest} deep; that is no KML for areas.`)
  const document = parsed(text)
  if (document.documentElement?.localName !== 'kml') throw new AreaFileRefused(`The file is XML but no KML: its first element is "${document.documentElement?.localName?.slice(0, 40) ?? ''}".`)
  const notes = document.getElementsByTagName('NetworkLink').length > 0 ? ['Links to other files in it were not followed.'] : []
  const { features } = kml(document)
  if (features.length === 0) throw new AreaFileRefused('The KML holds no placemark with a shape.')
  return { format: 'KML', notes, areas: areasOfFeatures(features, fileName) }
}

function parsed(text: string) {
  try {
    const parser = new DOMParser({
      onError: (level, message) => {
        if (level !== 'warning') throw new Error(String(message))
      },
    })
    return parser.parseFromString(text, 'text/xml')
  } catch {
    throw new AreaFileRefused('The file starts like KML but is not well-formed XML; it may be cut off.')
  }
}

/** How deep elements nest, by counting tags; comments and CDATA may only make it more. */
function depthOf(text: string): number {
  let [depth, most] = [0, 0]
  for (const [tag] of text.matchAll(/<\/?[A-Za-z][^<>]*>/g)) {
    if (tag.startsWith('</')) depth--
    else if (!tag.endsWith('/>')) most = Math.max(most, ++depth)
  }
  return most
}
