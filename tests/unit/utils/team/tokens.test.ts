import { expect, it } from 'vitest'
import { dayAfter, endOfDay } from '../../../../utils/team/tokens'

it('ends a token with the day that was chosen, and not at all without one', () => {
  expect(endOfDay('2026-12-31')).toBe('2026-12-31T23:59:59Z')
  expect(endOfDay('')).toBeNull()
})

it('counts days in UTC', () => {
  expect(dayAfter(new Date('2026-12-02T23:59:59Z'), 90)).toBe('2027-03-02')
})
