import { describe, expect, it } from 'vitest'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../../../shared/engine/machine/fabric'
import { couplerCount, familyName, familyProblems, qubitCount } from '../../../../shared/engine/machine/family'

const SMALL: PublishedFamily[] = [
  ...[1, 2, 3].flatMap((m) =>
    [1, 2, 4].flatMap((n) => [1, 3, 4].map((t): PublishedFamily => ({ kind: 'chimera', m, n, t }))),
  ),
  ...[2, 3, 4, 5].flatMap((m) => [true, false].map((trimmed): PublishedFamily => ({ kind: 'pegasus', m, trimmed }))),
  ...[1, 2, 3].flatMap((m) => [1, 2, 4, 5].map((t): PublishedFamily => ({ kind: 'zephyr', m, t }))),
  ...(['king', 'square'] as const).flatMap((kind) =>
    [1, 2, 5].flatMap((width) => [1, 2, 7].map((height): PublishedFamily => ({ kind, width, height }))),
  ),
  ...[1, 2, 5].flatMap((width) =>
    [1, 3].flatMap((height) => [1, 2, 4].map((depth): PublishedFamily => ({ kind: 'cubic', width, height, depth }))),
  ),
  ...[1, 2, 3, 6].flatMap((rows) =>
    [1, 2, 5].map((columns): PublishedFamily => ({ kind: 'heavy-hex', rows, columns })),
  ),
]

describe('closed forms', () => {
  it.each(SMALL.map((family) => [familyName(family), family] as const))('count what is built: %s', (_, family) => {
    const { graph, ids, segments } = buildFabric(family)
    expect(qubitCount(family)).toBe(graph.order)
    expect(couplerCount(family)).toBe(graph.ends.length / 2)
    expect(ids.length).toBe(graph.order)
    expect(segments.length).toBe(4 * graph.order)
  })
})

describe('familyName', () => {
  it('tells the families and sizes apart', () => {
    expect(familyName({ kind: 'chimera', m: 16, n: 12, t: 4 })).toBe('C(16,12,4)')
    expect(familyName({ kind: 'pegasus', m: 16, trimmed: true })).toBe('P(16)')
    expect(familyName({ kind: 'pegasus', m: 16, trimmed: false })).toBe('P(16) untrimmed')
    expect(familyName({ kind: 'zephyr', m: 15, t: 4 })).toBe('Z(15,4)')
    expect(familyName({ kind: 'king', width: 20, height: 30 })).toBe('king’s graph 20×30')
    expect(familyName({ kind: 'square', width: 20, height: 30 })).toBe('square grid 20×30')
    expect(familyName({ kind: 'cubic', width: 4, height: 5, depth: 6 })).toBe('cubic grid 4×5×6')
    expect(familyName({ kind: 'heavy-hex', rows: 4, columns: 5 })).toBe('heavy hexagons 4×5')
  })

  it('says of a graph of no family how large it is, as it says itself', () => {
    const custom = { kind: 'custom', file: 'lab.csv', couplers: 0, fingerprint: '', positions: 'drawn' } as const
    expect(familyName({ ...custom, qubits: 1812 })).toBe('graph of 1\u202f812 qubits')
    expect(familyName({ ...custom, qubits: 1 })).toBe('graph of 1 qubit')
    expect([
      qubitCount({ ...custom, qubits: 5, couplers: 7 }),
      couplerCount({ ...custom, qubits: 5, couplers: 7 }),
    ]).toEqual([5, 7])
  })
})

describe('familyProblems', () => {
  it('finds nothing wrong with the sizes of real machines', () => {
    for (const family of SMALL) expect(familyProblems(family)).toEqual([])
    expect(familyProblems({ kind: 'pegasus', m: 16, trimmed: true })).toEqual([])
    expect(familyProblems({ kind: 'king', width: 320, height: 320 })).toEqual([])
  })

  it('names every size that is not a whole number of at least the least', () => {
    expect(familyProblems({ kind: 'chimera', m: 0, n: 1.5, t: Number.NaN })).toEqual([
      'm must be a whole number of at least 1, not 0',
      'n must be a whole number of at least 1, not 1.5',
      't must be a whole number of at least 1, not NaN',
    ])
    expect(familyProblems({ kind: 'pegasus', m: 1, trimmed: true })).toEqual([
      'm must be a whole number of at least 2, not 1',
    ])
    expect(familyProblems({ kind: 'king', width: -3, height: 2 })).toEqual([
      'width must be a whole number of at least 1, not -3',
    ])
  })

  it('refuses what would be too large, without building it', () => {
    expect(familyProblems({ kind: 'square', width: 1000, height: 1000 })).toEqual([
      'square grid 1000×1000 would have 1\u202f000\u202f000 qubits; at most 131\u202f072 are possible',
      'square grid 1000×1000 would have 1\u202f998\u202f000 couplers; at most 1\u202f000\u202f000 are possible',
    ])
    expect(familyProblems({ kind: 'chimera', m: 1, n: 1, t: 1100 })).toEqual([
      'C(1,1,1100) would have 1\u202f210\u202f000 couplers; at most 1\u202f000\u202f000 are possible',
    ])
    expect(familyProblems({ kind: 'zephyr', m: 1e200, t: 1e200 })[0]).toContain('far too many qubits')
  })
})

describe('buildFabric', () => {
  it('throws the first problem', () => {
    expect(() => buildFabric({ kind: 'zephyr', m: 0, t: 4 })).toThrow(
      new RangeError('m must be a whole number of at least 1, not 0'),
    )
  })
})
