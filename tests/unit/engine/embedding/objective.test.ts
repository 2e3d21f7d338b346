import { describe, expect, it } from 'vitest'
import { packChains } from '../../../../shared/engine/embedding/embedding'
import { changedChains, compareQuality, qualityOf, reaches } from '../../../../shared/engine/embedding/objective'

const quality = (longest: number, total: number, changed = 0) => ({ longest, total, changed })

describe('comparing embeddings', () => {
  it('measures longest chain and total', () => {
    expect(qualityOf(packChains([[3], [1, 2, 4], []]))).toEqual(quality(3, 4))
  })

  it('compares by the objective, then by the other', () => {
    expect(compareQuality(quality(3, 9), quality(4, 5), 'longest chain')).toBeLessThan(0)
    expect(compareQuality(quality(3, 9), quality(4, 5), 'total qubits')).toBeGreaterThan(0)
    expect(compareQuality(quality(3, 9), quality(3, 8), 'longest chain')).toBeGreaterThan(0)
    expect(compareQuality(quality(3, 9), quality(4, 9), 'total qubits')).toBeLessThan(0)
    expect(compareQuality(quality(3, 9), quality(3, 9), 'longest chain')).toBe(0)
  })

  it('prefers the repair that changes fewer chains, whatever their lengths', () => {
    expect(compareQuality(quality(9, 99, 1), quality(2, 20, 2), 'longest chain')).toBeLessThan(0)
    expect(changedChains(packChains([[1, 2], [3], []]), packChains([[2, 1], [4], []]))).toBe(1)
    expect(changedChains(packChains([[1, 2], [3]]), packChains([[1], [3, 5]]))).toBe(2)
  })

  it('reaches a target only where one is asked, and all of it', () => {
    expect(reaches(quality(3, 9), { longestChain: null, totalQubits: null })).toBe(false)
    expect(reaches(quality(3, 9), { longestChain: 3, totalQubits: null })).toBe(true)
    expect(reaches(quality(3, 9), { longestChain: 3, totalQubits: 8 })).toBe(false)
    expect(reaches(quality(3, 9), { longestChain: null, totalQubits: 9 })).toBe(true)
  })
})
