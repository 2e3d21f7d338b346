import { describe, expect, it } from 'vitest'
import { lengthPoints } from '../../../../utils/embedding/lengths'

describe('lengthPoints', () => {
  it('runs from the shortest to the longest chain, gaps included', () => {
    expect(lengthPoints([0, 0, 3, 0, 1, 0])).toEqual([
      { x: 2, y: 3 },
      { x: 3, y: 0 },
      { x: 4, y: 1 },
    ])
    expect(lengthPoints([0, 0])).toEqual([])
  })
})
