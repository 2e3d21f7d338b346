import { expect, test } from 'vitest'
import { groupDigits } from '../../../shared/engine/digits'

test('groups digits by threes from the right', () => {
  expect([0, 12, 999, 1000, 12_345, 1_234_567].map(groupDigits)).toEqual([
    '0',
    '12',
    '999',
    '1\u202f000',
    '12\u202f345',
    '1\u202f234\u202f567',
  ])
  expect(groupDigits('1000000')).toBe('1\u202f000\u202f000')
})
