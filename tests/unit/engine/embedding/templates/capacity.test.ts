import { describe, expect, it } from 'vitest'
import { largestCompleteGraph } from '../../../../../shared/engine/embedding/templates/capacity'
import { qualityOf } from '../../../../../shared/engine/embedding/objective'
import { verifyEmbedding } from '../../../../../shared/engine/embedding/verify'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import { completeGraph } from '../../../../fixtures/graphs'
import { machineOf } from './attempts'

describe('largestCompleteGraph', () => {
  const machines: readonly [PublishedFamily, number, number][] = [
    [{ kind: 'chimera', m: 2, n: 2, t: 4 }, 0, 8],
    [{ kind: 'chimera', m: 3, n: 3, t: 4 }, 0.03, 8],
    [{ kind: 'pegasus', m: 2, trimmed: true }, 0.02, 5],
    [{ kind: 'zephyr', m: 1, t: 4 }, 0.02, 8],
    [{ kind: 'king', width: 9, height: 8 }, 0, 9],
  ]

  it.each(machines)('places what it says on %o with %f missing', (family, missing, least) => {
    const machine = machineOf(family, missing, missing / 2)
    const found = largestCompleteGraph(machine, 1, { tries: 5 })!
    expect(found.order).toBeGreaterThanOrEqual(least)
    expect(found.chainLength).toBe(qualityOf(found.chains).longest)
    expect(verifyEmbedding(completeGraph(found.order), machine.machine, machine.usable, found.chains)).toEqual([])
    expect(largestCompleteGraph(machine, 1, { tries: 5 })).toEqual(found)
  })

  it('has no template for lattices of points besides king’s graphs, and refuses no tries', () => {
    expect(largestCompleteGraph(machineOf({ kind: 'square', width: 5, height: 5 }), 1, { tries: 2 })).toBeNull()
    const chimera = machineOf({ kind: 'chimera', m: 2, n: 2, t: 4 })
    expect(() => largestCompleteGraph(chimera, 1, { tries: 0 })).toThrow(RangeError)
    expect(largestCompleteGraph(chimera, 1, { tries: 9, cancelled: () => true })).toBeNull()
  })
})
