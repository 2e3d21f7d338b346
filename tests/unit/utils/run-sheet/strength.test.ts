import { describe, expect, it } from 'vitest'
import { strengthText } from '../../../../utils/run-sheet/strength'

describe('strengthText', () => {
  it('shows one number for equal strengths and a range otherwise', () => {
    expect(strengthText({ min: 12, max: 12 + 1e-12 })).toBe('12')
    expect(strengthText({ min: 4.59375, max: 16.0125 })).toBe('4.594 to 16.01')
  })
})
