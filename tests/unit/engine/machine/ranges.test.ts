import { describe, expect, it } from 'vitest'
import { rangeProblems } from '../../../../shared/engine/machine/ranges'

describe('rangeProblems', () => {
  it('accepts symmetric and asymmetric ranges, with or without a coupling sum', () => {
    expect(rangeProblems({ h: [-4, 4], J: [-1, 1], couplingSum: [-5, 5] })).toEqual([])
    expect(rangeProblems({ h: [-4, 4], J: [-2, 1], couplingSum: [-18, 15] })).toEqual([])
    expect(rangeProblems({ h: [0, 0], J: [-1, 0], couplingSum: null })).toEqual([])
  })

  it('says for each range what is wrong', () => {
    expect(rangeProblems({ h: [4, -4], J: [0.5, 1], couplingSum: [Number.NaN, 5] })).toEqual([
      { path: 'h', message: 'h: the lower end 4 lies above the upper end -4' },
      { path: 'J', message: 'J: the range 0.5 to 1 leaves out 0, the value of an unused part' },
      { path: 'couplingSum', message: 'coupling sum: both ends must be numbers, not NaN and 5' },
    ])
    expect(rangeProblems({ h: [-Infinity, 1], J: [-1, -0.5], couplingSum: null }).map(({ path }) => path)).toEqual([
      'h',
      'J',
    ])
  })

  it('wants room for the negative couplings of chains', () => {
    expect(rangeProblems({ h: [-1, 1], J: [0, 1], couplingSum: [0, 3] })).toEqual([
      { path: 'J', message: 'J: the lower end must be below 0, since chains are held by negative couplings' },
      {
        path: 'couplingSum',
        message: 'coupling sum: the lower end must be below 0, since chains are held by negative couplings',
      },
    ])
  })
})
