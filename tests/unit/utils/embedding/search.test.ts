import { describe, expect, it } from 'vitest'
import { nextSearch, numberProblem, SEARCH_BOUNDS, tooSmall } from '../../../../utils/embedding/search'

describe('tooSmall', () => {
  it('says by how much, of whichever count is short', () => {
    expect(tooSmall({ variables: 12, interactions: 5 }, { qubits: 10, couplers: 9 })).toBe(
      '2 qubits too few for 12 variables',
    )
    expect(tooSmall({ variables: 10, interactions: 12 }, { qubits: 10, couplers: 9 })).toBe(
      '3 couplers too few for 12 interactions',
    )
    expect(tooSmall({ variables: 10, interactions: 9 }, { qubits: 10, couplers: 9 })).toBeNull()
  })
})

describe('numberProblem', () => {
  it('holds a number to its bounds', () => {
    expect(numberProblem('Tries', 1, SEARCH_BOUNDS.tries, true)).toBeUndefined()
    expect(numberProblem('Tries', 0, SEARCH_BOUNDS.tries, true)).toMatch(/lies from 1 to/)
    expect(numberProblem('Tries', 1.5, SEARCH_BOUNDS.tries, true)).toMatch(/whole/)
    expect(numberProblem('Tries', null, SEARCH_BOUNDS.tries, true)).toMatch(/not given/)
  })
})

describe('nextSearch', () => {
  it('takes another seed and twice the effort, within the bounds', () => {
    expect(nextSearch({ seed: 7, tries: 8, timeLimitSeconds: 30 })).toEqual({
      seed: 8,
      tries: 16,
      timeLimitSeconds: 60,
    })
    expect(nextSearch({ seed: Number.MAX_SAFE_INTEGER, tries: 900, timeLimitSeconds: 3000 })).toEqual({
      seed: 0,
      tries: 1000,
      timeLimitSeconds: 3600,
    })
  })
})
