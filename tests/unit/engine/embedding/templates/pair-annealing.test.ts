import { describe, expect, it } from 'vitest'
import { Watch } from '../../../../../shared/engine/embedding/progress'
import { cutWindow } from '../../../../../shared/engine/embedding/templates/corner-window'
import { crossingsOf } from '../../../../../shared/engine/embedding/templates/crossings'
import { fillPairing } from '../../../../../shared/engine/embedding/templates/fill'
import { matchInOrder } from '../../../../../shared/engine/embedding/templates/matching'
import type { Pairing } from '../../../../../shared/engine/embedding/templates/matching'
import { PairAnnealer } from '../../../../../shared/engine/embedding/templates/pair-annealing'
import { COST_MASK, COSTS, pairCosts, UNMET_UNIT } from '../../../../../shared/engine/embedding/templates/pair-costs'
import type { PairCosts } from '../../../../../shared/engine/embedding/templates/pair-costs'
import { createRandom } from '../../../../../shared/engine/random'
import { machineOf } from './attempts'

/** Cost and number of chains with an unmet pair or no corner, from scratch. */
function recount({ crossing, corner, width }: PairCosts, { verticals, horizontals }: Pairing) {
  let cost = 0
  const troubled = new Set<number>()
  verticals.forEach((v, i) => {
    const own = corner[v * width + horizontals[i]!]!
    cost += own
    if (own >= COSTS.noCorner) troubled.add(i)
    for (let j = 0; j < i; j++) {
      const met = [crossing[v * width + horizontals[j]!]!, crossing[verticals[j]! * width + horizontals[i]!]!]
      const pair = Math.min(...met)
      cost += pair & COST_MASK
      if (pair >= UNMET_UNIT) [i, j].forEach((chain) => troubled.add(chain))
    }
  })
  return { cost, trouble: troubled.size }
}

describe('PairAnnealer', () => {
  const { machine, usable, segments } = machineOf({ kind: 'pegasus', m: 5, trimmed: true }, 0.05, 0.05)
  const window = cutWindow(crossingsOf(machine, usable, segments)!, { x: 2, y: 2, size: 56, mirror: 0 })
  const costs = pairCosts(window)
  const start = fillPairing(window, matchInOrder(window), 42)!
  const watch = (): Watch =>
    new Watch({ now: () => 0, cancelled: () => false, report: () => {} }, 'template', 1, Infinity)

  it('keeps cost and troubled chains equal to a recount, uses every run at most once, and gets better', () => {
    const annealer = new PairAnnealer(costs, start, createRandom(1))
    const before = annealer.cost
    for (const hot of [2, 0.5, 0.1]) {
      annealer.run({ moves: 6000, hot, cold: hot / 4 }, watch())
      const pairing = annealer.pairing()
      expect({ cost: annealer.cost, trouble: annealer.trouble }).toEqual(recount(costs, pairing))
      expect(new Set(pairing.verticals).size).toBe(42)
      expect(new Set(pairing.horizontals).size).toBe(42)
    }
    expect(annealer.cost).toBeLessThan(before / 2)
  })

  it('knows no way to make more chains than there are runs', () => {
    expect(fillPairing(window, matchInOrder(window), 500)).toBeNull()
  })
})
