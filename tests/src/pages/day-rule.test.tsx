import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test, vi } from 'vitest'
import { DayRule } from '../../../src/pages/today/day-rule'
import { someDays } from '../support/fixtures'

const days = someDays()

function showAt(index: number) {
  const onChange = vi.fn()
  const day = days[index]
  if (!day) throw new Error('no such day')
  render(<DayRule days={days} day={day} floor={0.25} onChange={onChange} />)
  const slider = screen.getByRole('slider', { name: 'Day shown on the map' })
  slider.focus()
  return { slider, onChange }
}

test('the day rule says the day and the share seen', () => {
  expect(showAt(0).slider).toHaveAttribute('aria-valuetext', 'Mon 8 June, 60 % of your water seen')
})

test('a day without a layer is not read as nothing seen of it being zero', () => {
  expect(showAt(1).slider).toHaveAttribute('aria-valuetext', 'Tue 9 June, no layer')
})

test('arrow keys step, Home and End jump, PageUp goes back a week and stops at the first day', async () => {
  const { onChange } = showAt(2)
  await userEvent.keyboard('{ArrowLeft}{ArrowRight}{Home}{End}{PageUp}')
  expect(onChange.mock.calls.flat()).toEqual(['2026-06-09', '2026-06-11', '2026-06-08', '2026-06-11', '2026-06-08'])
})
