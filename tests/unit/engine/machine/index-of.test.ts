import { describe, expect, it } from 'vitest'
import { indexById } from '../../../../shared/engine/machine/index-of'

describe('indexById', () => {
  it('finds every number among gaps, and −1 for all the others', () => {
    const ids = Uint32Array.of(2, 3, 7, 11, 4294967295)
    const indexOf = indexById({ ids })
    const expected = new Map([...ids].map((id, index) => [id, index]))
    for (const id of [0, 1, 2, 3, 4, 5, 6, 7, 8, 10, 11, 12, 4294967294, 4294967295, 4294967296])
      expect(indexOf(id), String(id)).toBe(expected.get(id) ?? -1)
  })

  it('knows nothing that is not a whole number in the list', () => {
    const indexOf = indexById({ ids: Uint32Array.of(0, 1, 2) })
    for (const id of [-1, 0.5, Number.NaN, Infinity, -Infinity]) expect(indexOf(id)).toBe(-1)
    expect(indexById({ ids: new Uint32Array(0) })(0)).toBe(-1)
  })
})
