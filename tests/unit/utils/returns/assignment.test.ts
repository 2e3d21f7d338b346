import { describe, expect, it } from 'vitest'
import { compactAssignment } from '../../../../utils/returns/assignment'

describe('compactAssignment', () => {
  it('lists variables at 1 and counts what does not fit', () => {
    expect(compactAssignment({ a: 1, b: 0, c: 1, d: 1 }, 2)).toEqual({ labels: ['a', 'c'], more: 1, total: 3 })
    expect(compactAssignment({ a: -1, b: 1 }, 2)).toEqual({ labels: ['b'], more: 0, total: 1 })
  })
})
