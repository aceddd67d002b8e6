import { numbersIn, type TiffDirectory, tags } from './tiff-directory'

const names: Record<number, string> = {
  1024: 'GTModelTypeGeoKey', 1025: 'GTRasterTypeGeoKey', 1026: 'GTCitationGeoKey', 2048: 'GeographicTypeGeoKey',
  2049: 'GeogCitationGeoKey', 2050: 'GeogGeodeticDatumGeoKey', 2051: 'GeogPrimeMeridianGeoKey',
  2052: 'GeogLinearUnitsGeoKey', 2053: 'GeogLinearUnitSizeGeoKey', 2054: 'GeogAngularUnitsGeoKey',
  2055: 'GeogAngularUnitSizeGeoKey', 2056: 'GeogEllipsoidGeoKey', 2057: 'GeogSemiMajorAxisGeoKey',
  2058: 'GeogSemiMinorAxisGeoKey', 2059: 'GeogInvFlatteningGeoKey', 2060: 'GeogAzimuthUnitsGeoKey',
  2061: 'GeogPrimeMeridianLongGeoKey', 2062: 'GeogTOWGS84GeoKey', 3072: 'ProjectedCSTypeGeoKey',
  3073: 'PCSCitationGeoKey', 3074: 'ProjectionGeoKey', 3075: 'ProjCoordTransGeoKey', 3076: 'ProjLinearUnitsGeoKey',
  3077: 'ProjLinearUnitSizeGeoKey', 3078: 'ProjStdParallel1GeoKey', 3079: 'ProjStdParallel2GeoKey',
  3080: 'ProjNatOriginLongGeoKey', 3081: 'ProjNatOriginLatGeoKey', 3082: 'ProjFalseEastingGeoKey',
  3083: 'ProjFalseNorthingGeoKey', 3084: 'ProjFalseOriginLongGeoKey', 3085: 'ProjFalseOriginLatGeoKey',
  3086: 'ProjFalseOriginEastingGeoKey', 3087: 'ProjFalseOriginNorthingGeoKey', 3088: 'ProjCenterLongGeoKey',
  3089: 'ProjCenterLatGeoKey', 3090: 'ProjCenterEastingGeoKey', 3091: 'ProjCenterNorthingGeoKey',
  3092: 'ProjScaleAtNatOriginGeoKey', 3093: 'ProjScaleAtCenterGeoKey', 3094: 'ProjAzimuthAngleGeoKey',
  3095: 'ProjStraightVertPoleLongGeoKey', 3096: 'ProjRectifiedGridAngleGeoKey', 4096: 'VerticalCSTypeGeoKey',
  4097: 'VerticalCitationGeoKey', 4098: 'VerticalDatumGeoKey', 4099: 'VerticalUnitsGeoKey',
}

export type GeoKeys = Record<string, number | number[] | string>

/** The geo keys of an image by name, or null without any. Throws when they point outside their tags. OGC 19-008. */
export function geoKeysOf(directory: TiffDirectory): GeoKeys | null {
  const table = numbersIn(directory, tags.geoKeys)
  if (table.length < 4) return null
  const keys: GeoKeys = {}
  const count = table[3]!
  if (table.length < 4 + 4 * count) throw new Error(`${count} geo keys are declared`)
  for (let i = 1; i <= count; i++) {
    const [id, place, length, value] = table.slice(4 * i, 4 * i + 4) as [number, number, number, number]
    const name = names[id]
    if (name === undefined) continue
    if (place === 0) keys[name] = value
    else keys[name] = valueAt(directory, place, value, length)
  }
  return keys
}

function valueAt(directory: TiffDirectory, tag: number, from: number, length: number): number | number[] | string {
  const stored = directory.get(tag)
  if (stored === undefined || from + length > stored.length + (typeof stored === 'string' ? 1 : 0)) {
    throw new Error(`a geo key points outside tag ${tag}`)
  }
  if (typeof stored === 'string') return stored.slice(from, from + length).replace(/\|$/, '')
  return length === 1 ? stored[from]! : stored.slice(from, from + length)
}
