import { describe, expect, it } from 'vitest'
import { KEPT_DEFAULTS, keepLayout, keptLayout } from '../../../../utils/problem/kept-layouts'

/** A browser's storage; refuses to hold more than `room` characters. */
function storageOf(room = Infinity) {
  const items = new Map<string, string>()
  return {
    items,
    getItem: (key: string) => items.get(key) ?? null,
    setItem: (key: string, value: string) => {
      if (value.length > room) throw new DOMException('full', 'QuotaExceededError')
      items.set(key, value)
    },
    removeItem: (key: string) => void items.delete(key),
  }
}
const layout = (positions: readonly number[], fingerprint = 'f') => ({
  fingerprint,
  seed: 3,
  made: 120,
  settled: false,
  positions: Float32Array.from(positions),
})
const of = (variables: number, fingerprint = 'f') => ({ fingerprint, variables })

describe('kept layouts', () => {
  it('come back as they were, to a hair of the extent', () => {
    const storage = storageOf()
    const positions = [-40, 12, 35.5, -80, 0.125, 7]
    keepLayout(storage, 'p', layout(positions))
    const kept = keptLayout(storage, 'p', of(3))!
    expect({ ...kept, positions: null }).toEqual({ ...layout([]), positions: null })
    kept.positions.forEach((place, k) => expect(Math.abs(place - positions[k]!)).toBeLessThan(92 / 65_535))
  })

  it('are void for another content or number of variables', () => {
    const storage = storageOf()
    keepLayout(storage, 'p', layout([1, 2, 3, 4]))
    expect(keptLayout(storage, 'p', of(2, 'g'))).toBeNull()
    expect(keptLayout(storage, 'p', of(3))).toBeNull()
    expect(keptLayout(storage, 'q', of(2))).toBeNull()
    expect(keptLayout(storage, 'p', of(2))).not.toBeNull()
  })

  it('hold a single variable', () => {
    const storage = storageOf()
    keepLayout(storage, 'p', layout([7, -2]))
    expect([...keptLayout(storage, 'p', of(1))!.positions]).toEqual([7, -2])
  })

  it('are bounded: the oldest are forgotten, those kept again are the newest', () => {
    const storage = storageOf()
    keepLayout(storage, 'first', layout([1, 2]))
    keepLayout(storage, 'second', layout([1, 2]))
    for (let k = 0; k < KEPT_DEFAULTS.most - 2; k++) keepLayout(storage, `p${k}`, layout([1, 2]))
    keepLayout(storage, 'first', layout([1, 2]))
    keepLayout(storage, 'last', layout([1, 2]))
    expect(keptLayout(storage, 'first', of(1))).not.toBeNull()
    expect(keptLayout(storage, 'second', of(1))).toBeNull()
    expect(storage.items.size).toBe(KEPT_DEFAULTS.most + 1)
  })

  it('push no other out by being kept again and again', () => {
    const storage = storageOf()
    keepLayout(storage, 'other', layout([1, 2]))
    for (let k = 0; k < 2 * KEPT_DEFAULTS.most; k++) keepLayout(storage, 'p', layout([1, 2]))
    expect(keptLayout(storage, 'other', of(1))).not.toBeNull()
  })

  it('give way quietly where there is no room, or what is stored cannot be read', () => {
    const storage = storageOf(20)
    keepLayout(storage, 'p', layout([1, 2, 3, 4]))
    expect(keptLayout(storage, 'p', of(2))).toBeNull()
    for (const text of ['{', 'null', '{"fingerprint":"f"}', '{"fingerprint":"f","places":"*","box":{"extent":1}}']) {
      storage.items.set(`${KEPT_DEFAULTS.prefix}p`, text)
      expect(keptLayout(storage, 'p', of(2))).toBeNull()
    }
  })
})
