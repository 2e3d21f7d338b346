import { expect, it } from 'vitest'
import { networkOf } from '../../../../../shared/engine/problem/presolve/max-flow'
import { strongComponents } from '../../../../../shared/engine/problem/presolve/strong-components'
import { createRandom } from '../../../../../shared/engine/random'

it('puts nodes together that reach each other, and what they lead to first', () => {
  const random = createRandom(51)
  for (let trial = 0; trial < 200; trial++) {
    const nodes = 1 + random.below(12)
    const heads: number[] = []
    for (let k = random.below(2 * nodes); k > 0; k--) heads.push(random.below(nodes), random.below(nodes))
    const network = networkOf(nodes, Uint32Array.from(heads), 0, 0)
    const isOpen = Uint8Array.from(heads, () => random.below(2))
    const isLeftOut = Uint8Array.from({ length: nodes }, () => (random.below(6) === 0 ? 1 : 0))
    // Closure of "leads to" by repeated squaring of the relation.
    const leads = Array.from({ length: nodes }, (_, a) => Array.from({ length: nodes }, (_, b) => a === b))
    heads.forEach((head, e) => {
      if (isOpen[e] === 1 && !isLeftOut[head] && !isLeftOut[heads[e ^ 1]!]) leads[heads[e ^ 1]!]![head] = true
    })
    for (let via = 0; via < nodes; via++)
      for (const row of leads) if (row[via]) leads[via]!.forEach((leadsOn, b) => (row[b] ||= leadsOn))
    const { count, componentOf } = strongComponents(network, isOpen, isLeftOut)
    const taken = [...isLeftOut.keys()].filter((v) => isLeftOut[v] === 0)
    componentOf.forEach((c, v) => expect(c < count).toBe(isLeftOut[v] === 0))
    expect(new Set(taken.map((v) => componentOf[v])).size).toBe(count)
    for (const a of taken)
      for (const b of taken) {
        expect(componentOf[a] === componentOf[b]).toBe(leads[a]![b]! && leads[b]![a]!)
        if (leads[a]![b]) expect(componentOf[b]).toBeLessThanOrEqual(componentOf[a]!)
      }
  }
})
