import { describe, expect, it } from 'vitest'
import { groupsEvidence } from '../../../../../shared/engine/readout/advice/evidence-of-groups'
import { packRows } from '../../../../../shared/engine/sampling/merge'
import { isingOf } from '../../programming/instances'

/** Four variables; of the first three exactly one is to be 1, P = 4: linear −4, pairs 8. A coupling of 3 to the fourth. */
const qubo = isingOf(
  [-4, -4, -4, -2],
  [
    [0, 1, 8],
    [0, 2, 8],
    [1, 2, 8],
    [2, 3, -3],
  ],
)
const groups = [{ name: 'one of three', kind: 'exactly' as const, k: 1, members: [0, 1, 2] }]
const states = packRows(4, [1, -1, -1, 1, 1, 1, -1, -1, -1, -1, -1, -1], [5, 2, 1])

describe('groupsEvidence', () => {
  it('says how often a group is broken, whether the best breaks it, and how strong its penalty is', () => {
    const kept = groupsEvidence({ qubo, groups, states, best: 0 })
    expect(kept.groups).toMatchObject([{ name: 'one of three', isBrokenInBest: false, violations: 3, weight: 4 }])
    expect(kept.groups[0]!.sufficient).not.toBeNull()
    expect(kept.largest).toEqual({ withinGroups: 8, elsewhere: 3 })
    expect(groupsEvidence({ qubo, groups, states, best: 1 }).groups[0]!.isBrokenInBest).toBe(true)
    expect(groupsEvidence({ qubo, groups, states, best: null }).groups[0]!.isBrokenInBest).toBe(false)
  })

  it('takes fields of variables in no group for the rest', () => {
    const free = { ...qubo, linear: Float64Array.of(-4, -4, -4, -9) }
    expect(groupsEvidence({ qubo: free, groups, states, best: 0 }).largest.elsewhere).toBe(9)
    expect(groupsEvidence({ qubo, groups: [], states, best: 0 })).toMatchObject({
      groups: [],
      largest: { withinGroups: 0, elsewhere: 8 },
    })
  })
})
