import { describe, expect, it } from 'vitest'
import { allocate } from '../../../../../shared/engine/embedding/chains/kernel'

describe('allocate', () => {
  it.each(['plain', 'assembly'] as const)('gives zeroed arrays that do not overlap (%s)', (choice) => {
    const { ints, floats, kernel } = allocate(choice, { a: 40_000, b: 3 }, { c: 5 })
    expect(kernel === null).toBe(choice === 'plain')
    expect([ints.a.length, ints.b.length, floats.c.length]).toEqual([40_000, 3, 5])
    ints.a.fill(1)
    floats.c.fill(2.5)
    expect([...ints.b]).toEqual([0, 0, 0])
    expect(ints.a.every((value) => value === 1)).toBe(true)
    expect([...floats.c]).toEqual([2.5, 2.5, 2.5, 2.5, 2.5])
  })
})
