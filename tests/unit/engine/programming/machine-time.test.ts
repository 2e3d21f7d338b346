import { describe, expect, it } from 'vitest'
import { machineTimeEstimate, readsPerGauge } from '../../../../shared/engine/programming/machine-time'

const timing = { programMicroseconds: 15000, readoutMicroseconds: 120, delayMicroseconds: 21 }

describe('machineTimeEstimate', () => {
  it('adds programming per gauge and anneal, readout and delay per read', () => {
    expect(machineTimeEstimate({ gauges: 4, reads: 1000, annealMicroseconds: 20.5, timing })).toEqual({
      programmingMicroseconds: 60000,
      annealMicroseconds: 20500,
      readoutMicroseconds: 120000,
      delayMicroseconds: 21000,
      totalMicroseconds: 221500,
    })
  })

  it.each([
    { gauges: 0, reads: 10, annealMicroseconds: 1, timing },
    { gauges: 1, reads: 1.5, annealMicroseconds: 1, timing },
    { gauges: 1, reads: 1, annealMicroseconds: -1, timing },
    { gauges: 1, reads: 1, annealMicroseconds: 1, timing: { ...timing, delayMicroseconds: Number.NaN } },
  ])('throws for what is no count or time (%#)', (input) => {
    expect(() => machineTimeEstimate(input)).toThrow(RangeError)
  })
})

describe('readsPerGauge', () => {
  it('splits as evenly as possible', () => {
    expect(readsPerGauge(10, 4)).toEqual([3, 3, 2, 2])
    expect(readsPerGauge(2, 3)).toEqual([1, 1, 0])
  })
})
