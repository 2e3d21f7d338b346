import { describe, expect, it } from 'vitest'
import type { CornerWindow } from '../../../../../shared/engine/embedding/templates/corner-window'
import { crosses, cutWindow } from '../../../../../shared/engine/embedding/templates/corner-window'
import { crossingsOf } from '../../../../../shared/engine/embedding/templates/crossings'
import { matchInOrder } from '../../../../../shared/engine/embedding/templates/matching'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../../shared/engine/random'
import { machineOf } from './attempts'

/** The largest order-preserving set of corners whose arms reach from (v, h) to the far ends, by recursion. */
function largest(window: CornerWindow, endT: number, endU: number, v = 0, h = 0): number {
  const memo = new Map<number, number>()
  const width = window.horizontals.length
  const go = (a: number, b: number): number => {
    if (a >= window.verticals.length || b >= width) return 0
    const key = a * width + b
    const known = memo.get(key)
    if (known !== undefined) return known
    const corner =
      crosses(window, a, b) &&
      window.reachT[a]! >= endT &&
      window.reachU[b]! <= endU &&
      window.t[b]! <= endT &&
      window.u[a]! >= endU
    const value = Math.max(go(a + 1, b), go(a, b + 1), corner ? 1 + go(a + 1, b + 1) : 0)
    memo.set(key, value)
    return value
  }
  return go(v, h)
}

const FAMILIES: readonly PublishedFamily[] = [
  { kind: 'chimera', m: 3, n: 4, t: 4 },
  { kind: 'pegasus', m: 3, trimmed: true },
  { kind: 'zephyr', m: 2, t: 4 },
]

describe('matchInOrder', () => {
  it('finds as many chains as a recursion over all ends, in order, every corner joined', () => {
    const random = createRandom(12)
    for (let k = 0; k < 36; k++) {
      const share = k % 3 === 0 ? 0 : 0.1 * random.float()
      const { machine, usable, segments } = machineOf(FAMILIES[k % FAMILIES.length]!, share, share, k)
      const place = { x: random.below(9), y: random.below(9), size: 4 + random.below(14), mirror: random.below(4) }
      const window = cutWindow(crossingsOf(machine, usable, segments)!, place)
      const { verticals, horizontals } = matchInOrder(window)
      const ends = window.t.length > 0 && window.u.length > 0
      const own = ends ? largest(window, window.t[window.t.length - 1]!, window.u[0]!) : 0
      expect(verticals.length).toBe(horizontals.length)
      if (share === 0 && k % FAMILIES.length === 0) expect(verticals.length).toBe(own)
      verticals.forEach((v, i) => {
        expect(crosses(window, v, horizontals[i]!)).toBe(true)
        if (i === 0) return
        expect(v).toBeGreaterThan(verticals[i - 1]!)
        expect(horizontals[i]!).toBeGreaterThan(horizontals[i - 1]!)
      })
      const capped = new Set<number>()
      for (const t of [...window.reachT, window.t[window.t.length - 1]!])
        for (const u of [...window.reachU, window.u[0]!])
          capped.add(largest(window, Math.min(Math.floor(t), window.t.at(-1)!), Math.max(Math.ceil(u), window.u[0]!)))
      expect(verticals.length).toBeLessThanOrEqual(Math.max(0, ...capped))
      expect([...capped, 0]).toContain(verticals.length)
    }
  })
})
