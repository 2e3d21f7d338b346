import { describe, expect, it } from 'vitest'
import { logTicks, wholeTicks } from '../../../../../utils/ui/chart/ticks'

describe('logTicks', () => {
  it('is fine within a decade', () => {
    expect(logTicks(4.4, 31)).toEqual([5, 6, 8, 10, 12, 15, 20, 25, 30])
  })

  it('grows coarser over several decades and stays inside the ends', () => {
    const ticks = logTicks(1e-3, 1e3)
    expect(ticks.length).toBeLessThanOrEqual(12)
    expect(Math.min(...ticks)).toBeGreaterThanOrEqual(1e-3)
    expect(Math.max(...ticks)).toBeLessThanOrEqual(1e3)
  })

  it('has none where a logarithm has none', () => {
    expect(logTicks(0, 10)).toEqual([])
    expect(logTicks(5, 5)).toEqual([])
  })
})

describe('logTicks with little room', () => {
  it('are evenly thinned, down to one a decade', () => {
    expect(logTicks(0.03, 3, 5)).toEqual([0.03, 0.1, 0.3, 1, 3])
    expect(logTicks(0.03, 3, 4)).toEqual([0.1, 1])
  })
})

describe('wholeTicks', () => {
  it('ticks every whole number when they are few', () => {
    expect(wholeTicks([0, 1, 2, 5])).toEqual([0, 1, 2, 3, 4, 5])
  })

  it('leaves the rest to the library', () => {
    expect(wholeTicks([])).toBeUndefined()
    expect(wholeTicks([0.5, 1])).toBeUndefined()
    expect(wholeTicks([20, 94])).toBeUndefined()
  })
})
