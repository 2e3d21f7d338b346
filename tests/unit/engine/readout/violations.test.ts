import { describe, expect, it } from 'vitest'
import type { VariableGroup } from '../../../../shared/engine/problem/groups/group'
import { createRandom } from '../../../../shared/engine/random'
import { violationsOf } from '../../../../shared/engine/readout/violations'
import { strideOf } from '../../../../shared/engine/sampling/samples'

const KINDS = ['exactly', 'at most', 'at least'] as const

describe('violations', () => {
  it('count as a look at each read by itself does', () => {
    for (let seed = 1; seed <= 30; seed++) {
      const random = createRandom(seed)
      const width = 1 + random.below(20)
      const states = Array.from({ length: 15 }, () => Array.from({ length: width }, () => random.below(2)))
      const bytes = new Uint8Array(15 * strideOf(width))
      states.forEach((state, r) => state.forEach((x, c) => (bytes[r * strideOf(width) + (c >> 3)]! |= x << (c & 7))))
      const counts = Uint32Array.from(states, () => 1 + random.below(9))
      const groups: VariableGroup[] = KINDS.map((kind) => ({
        kind,
        k: random.below(4),
        members: Array.from({ length: width }, (_, i) => i).filter(() => random.below(2) === 1),
      }))
      const reads = states.flatMap((state, r) => Array.from({ length: counts[r]! }, () => state))
      const breaks = (state: number[], { kind, k, members }: VariableGroup) => {
        const set = members.reduce((sum, i) => sum + state[i]!, 0)
        return { exactly: set !== k, 'at most': set > k, 'at least': set < k }[kind]
      }
      expect(violationsOf({ width, rows: 15, bytes, counts }, groups)).toEqual({
        reads: reads.length,
        perGroup: Float64Array.from(groups, (group) => reads.filter((state) => breaks(state, group)).length),
        any: reads.filter((state) => groups.some((group) => breaks(state, group))).length,
      })
    }
  })

  it('refuse a member that is no variable', () => {
    const states = { width: 2, rows: 0, bytes: new Uint8Array(0), counts: new Uint32Array(0) }
    expect(() => violationsOf(states, [{ kind: 'exactly', k: 1, members: [2] }])).toThrow('member 2')
  })
})
