import { describe, expect, test } from 'vitest'
import { outlineText } from '../../../src/components/outline/outline-text'
import { parseOutline } from '../../../src/components/outline/parse-outline'
import { parsePosition } from '../../../src/components/outline/parse-position'

describe('a position', () => {
  test.each([
    ['51.95, -10.70', 51.95, -10.7],
    ['51.95 -10.70', 51.95, -10.7],
    ['51 57.0 N, 10 42.0 W', 51.95, -10.7],
    ['51°57′N 10°42′W', 51.95, -10.7],
    ["51°57'00\"N, 10°42'00\"W", 51.95, -10.7],
    ['N 51 57, W 10 42', 51.95, -10.7],
    ['10 42 W, 51 57 N', 51.95, -10.7],
    ['-33.5, 151.25', -33.5, 151.25],
  ])('%s is latitude %d, longitude %d', (text, latitude, longitude) => {
    const read = parsePosition(text)
    expect(read?.latitude).toBeCloseTo(latitude, 9)
    expect(read?.longitude).toBeCloseTo(longitude, 9)
  })

  test.each(['', 'here', '91, 0', '51.95', '51 75 N, 10 42 W', '51, 10, 12', '10 W, 11 W'])('"%s" is none', (text) => {
    expect(parsePosition(text)).toBeUndefined()
  })
})

describe('an outline as text', () => {
  test('closes the ring that was typed open, longitude first', () => {
    expect(parseOutline('51, -11\n51, -10\n52, -10').geometry).toEqual({
      type: 'Polygon',
      coordinates: [[[-11, 51], [-10, 51], [-10, 52], [-11, 51]]],
    })
  })

  test('names the line that cannot be read', () => {
    expect(parseOutline('51, -11\nnorth of the head\n52, -10').problem).toContain('Line 2')
  })

  test('asks for three corners', () => expect(parseOutline('51, -11\n52, -10').problem).toContain('at least three corners'))

  test('takes a GeoJSON feature, or a collection of just one', () => {
    const geometry = { type: 'Polygon', coordinates: [[[0, 0], [1, 0], [1, 1], [0, 0]]] }
    const feature = { type: 'Feature', properties: {}, geometry }
    expect(parseOutline(JSON.stringify(feature)).geometry).toEqual(geometry)
    expect(parseOutline(JSON.stringify({ type: 'FeatureCollection', features: [feature] })).geometry).toEqual(geometry)
    expect(parseOutline(JSON.stringify({ type: 'FeatureCollection', features: [feature, feature] })).problem).toContain('holds 2')
  })

  test('says what is wrong with other GeoJSON', () => {
    expect(parseOutline('{"type":"Point","coordinates":[0,0]}').problem).toBe('A region is a Polygon or MultiPolygon, not Point.')
    expect(parseOutline('{"type":"Polygon",').problem).toContain('not complete')
  })

  test('what is written out is read back the same', () => {
    const geometry = { type: 'Polygon' as const, coordinates: [[[-11.2, 51], [-10, 51], [-10, 52.25], [-11.2, 51]]] }
    expect(parseOutline(outlineText(geometry)).geometry).toEqual(geometry)
  })
})
