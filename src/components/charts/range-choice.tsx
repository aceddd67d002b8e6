import { daysBetween, daySpan } from '../../lib/dates'
import { countWords } from '../../lib/format'
import { Button } from '../ui/button'
import { Choice } from '../ui/choice'
import { type DayRange, movedRange, namedRange, nameOf, yearRange, yearsOf } from './shown-range'

function wholeSpan({ from, to }: DayRange): string {
  const years = Math.round(daysBetween(from, to) / 365.25)
  return years < 2 ? 'all' : `all ${countWords(years, 'year')}`
}

interface Props {
  range: DayRange
  span: DayRange
  onChange: (range: DayRange) => void
}

/** Which days a chart shows: by length, by year, or one window after another. */
export function RangeChoice({ range, span, onChange }: Props) {
  const years = yearsOf(span)
  const name = nameOf(range, span)
  const year = years.find((one) => {
    const { from, to } = yearRange(one, span)
    return from === range.from && to === range.to
  })
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-2" data-no-print>
      <Choice
        label="Days shown"
        options={[
          { value: 'days', label: '120 days' },
          { value: 'year', label: '1 year' },
          { value: 'all', label: wholeSpan(span) },
        ]}
        value={name}
        onChange={(next) => onChange(namedRange(next, span))}
      />
      <label className="flex items-center gap-2 text-small text-ink2">
        Year
        <select
          className="fig min-h-11 border-b border-accent bg-transparent pr-2 text-body text-accent tab:min-h-9"
          value={year ?? ''}
          onChange={(event) => onChange(yearRange(Number(event.target.value), span))}
        >
          {year === undefined && <option value="">choose</option>}
          {years.map((one) => (
            <option key={one} value={one}>
              {one}
            </option>
          ))}
        </select>
      </label>
      <div className="flex items-center gap-3">
        <Button kind="text" size="small" disabled={range.from === span.from} onClick={() => onChange(movedRange(range, span, -1))}>
          Earlier
        </Button>
        <Button kind="text" size="small" disabled={range.to === span.to} onClick={() => onChange(movedRange(range, span, 1))}>
          Later
        </Button>
      </div>
      {name === undefined && <span className="text-small text-ink2">{daySpan(range.from, range.to)}</span>}
    </div>
  )
}
