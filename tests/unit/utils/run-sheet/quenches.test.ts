import { describe, expect, it } from 'vitest'
import { NEW_SERIES, readSeries } from '../../../../utils/run-sheet/quenches'

const read = (change: Partial<typeof NEW_SERIES>) => readSeries({ ...NEW_SERIES, ...change })

describe('a quench series as typed', () => {
  it('is even between two values', () => {
    expect(read({ from: 0.2, to: 0.5, count: 4 })).toEqual({ series: { points: [0.2, 0.3, 0.4, 0.5] } })
    expect(read({ quenchMicroseconds: 2 })).toMatchObject({ series: { quenchMicroseconds: 2 } })
  })

  it('is a list with blanks, commas or semicolons between', () => {
    expect(read({ form: 'list', list: ' 0.31, 0.4;0.55  .6' })).toEqual({ series: { points: [0.31, 0.4, 0.55, 0.6] } })
  })

  it.each([
    [{ from: 0 }, /between 0 and 1/],
    [{ from: 0.8, to: 0.2 }, /lower first/],
    [{ to: null }, /two values/],
    [{ count: 51 }, /from 2 to 50/],
    [{ count: 2.5 }, /whole number/],
    [{ form: 'list', list: '' } as const, /values of s/],
    [{ form: 'list', list: '0.2 x' } as const, /values of s/],
    [{ form: 'list', list: '0.2 0.2' } as const, /each s once/],
    [{ form: 'list', list: Array.from({ length: 51 }, (_, k) => (k + 1) / 60).join(' ') } as const, /at most 50/],
    [{ quenchMicroseconds: 0 }, /above 0 µs/],
    [{ quenchMicroseconds: Number.NaN }, /above 0 µs/],
  ])('complains of %o', (change, complaint) => {
    expect(read(change)).toMatchObject({ complaint: expect.stringMatching(complaint) })
  })
})
