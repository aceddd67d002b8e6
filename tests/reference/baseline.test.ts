import { describe, expect, it } from 'vitest'
import { seasonalBaseline, type SeasonalBaseline } from '../../shared/science/baseline'
import reference from './values/baseline.json'

const days = Int32Array.from(reference.days)
const values = Float64Array.from(reference.values)

describe('what is usual by date agrees with a writing in numpy', () => {
  it.each(reference.cases)(
    '$fromYear to $toYear, $halfWidthDays days each side, smoothed over $smoothingDays',
    ({ columns, ...settings }) => {
      const found = seasonalBaseline({ days, values, ...settings })
      for (const [name, expected] of Object.entries(columns)) {
        const column = found[name as keyof SeasonalBaseline]
        expect(column).toHaveLength(366)
        for (const [i, value] of expected.entries()) {
          if (value === null) expect([name, i, column[i]]).toEqual([name, i, null])
          else expect(column[i], `${name} ${i + 1}`).toBeCloseTo(value, 10)
        }
      }
    },
  )

  it('the reference has dates without values, so missing is compared too', () => {
    expect(reference.cases[2]!.columns.p90).toContain(null)
  })
})
