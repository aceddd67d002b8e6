import { expect, test } from 'vitest'
import { clockTime, daySpan, localDay, longDay } from '../../../src/lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { bearing, degrees, megabytes, percent, shortChecksum, threeDigits, timesUsual } from '../../../src/lib/format'
import { safeNext } from '../../../src/lib/safe-next'
import { yearsWords } from '../../../src/lib/years-words'

test('figures have three digits, times usual two, coverage whole per cent', () => {
  expect([4.8912, 0.03124, 13.61, 110.4, 12345].map(threeDigits)).toEqual(['4.89', '0.0312', '13.6', '110', '12\u202f300'])
  expect([3.41, 12.3, 0.85].map(timesUsual)).toEqual(['3.4', '12', '0.85'])
  expect([0, 0.003, 0.714, 1].map(percent)).toEqual(['0 %', 'under 1 %', '71 %', '100 %'])
})

test('units are written with their powers', () => {
  expect(unitWords('mg m-3')).toBe('mg m⁻³')
  expect(unitWords('sr^-1')).toBe('sr⁻¹')
  expect(unitWords(null)).toBe('')
})

test('positions, bearings, sizes and checksums are short and exact', () => {
  expect(degrees(-11.5, 'longitude')).toBe('11°30′W')
  expect(degrees(52, 'latitude')).toBe('52°N')
  expect(degrees(190, 'longitude')).toBe('170°W')
  expect(degrees(0, 'longitude')).toBe('0°')
  expect([256.2, 359.8, -90].map(bearing)).toEqual(['256° WSW', '000° N', '270° W'])
  expect(megabytes(2_400_000)).toBe('2.4 MB')
  expect(shortChecksum('9f2c41d0aabb77ab')).toBe('9f2c 41d0 … 77ab')
})

test('a calendar day never moves with a zone; an instant does', () => {
  expect(longDay('2026-06-10')).toBe('Wed 10 June')
  expect(localDay('2026-06-10T23:30:00Z', 'Europe/Dublin')).toBe('2026-06-11')
  expect(clockTime('2026-06-11T03:12:00Z', 'Europe/Dublin')).toBe('04:12')
  expect(daySpan('2026-06-05', '2026-06-15')).toBe('5 to 15 June')
})

test('years are told as runs', () => {
  expect(yearsWords([2016, 2017, 2018, 2020, 2022, 2023])).toBe('2016 to 2018, 2020, 2022 to 2023')
})

test('after signing in nobody is led out of the program', () => {
  expect(safeNext('/alerts/41?x=1#why')).toBe('/alerts/41?x=1#why')
  for (const bad of [null, '', 'https://elsewhere.example/', '//elsewhere.example', '/\\elsewhere.example', 'javascript:alert(1)']) expect(safeNext(bad)).toBe('/')
})
