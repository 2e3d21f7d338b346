import { describe, expect, it } from 'vitest'
import { geometryOf } from '../../../../shared/engine/machine/geometry'

const segments = Float32Array.of(0, 0, 0, 0)
const custom = { kind: 'custom', file: 'lab.csv', qubits: 1, couplers: 0, fingerprint: '' } as const

describe('geometryOf', () => {
  it('knows places and family of a family', () => {
    const family = { kind: 'king', width: 1, height: 1 } as const
    expect(geometryOf({ family, segments })).toEqual({ segments, family })
  })

  it('trusts given positions of a graph of no family, and not a drawing of it', () => {
    expect(geometryOf({ family: { ...custom, positions: 'given' }, segments })).toEqual({ segments, family: null })
    expect(geometryOf({ family: { ...custom, positions: 'drawn' }, segments })).toEqual({
      segments: null,
      family: null,
    })
  })
})
