import { describe, expect, it } from 'vitest'
import { chainGeometry } from '../../../../utils/lattice/geometry'
import { hueConflicts, HUE_WEIGHTS, huesOfChains } from '../../../../utils/lattice/hue-conflicts'
import { placesOfPair } from '../../../../utils/lattice/places'
import { neighboursOf, rolesOf } from '../../../../utils/lattice/roles'
import { SPAN_DEFAULTS } from '../../../../utils/lattice/spans'
import { HAND_DRAWN, latticeOf, layerOf } from './small-lattice'

const over = SPAN_DEFAULTS.overhang

describe('roles of qubits and couplers', () => {
  it('tells chain couplers from interaction couplers, and counts only pairs that interact', () => {
    const roles = rolesOf(HAND_DRAWN, layerOf([[0, 1], [3], [2]], [[1, 0]]))
    expect([...roles.owner]).toEqual([0, 0, 2, 1, -1])
    expect([...roles.chainCouplers]).toEqual([0])
    expect([...roles.interactionCouplers]).toEqual([1])
  })

  it('lists neighbours once each, ascending', () => {
    expect(
      neighboursOf(
        layerOf(
          [[0], [1], [2]],
          [
            [2, 0],
            [0, 1],
            [1, 0],
          ],
        ),
      ),
    ).toEqual([[1, 2], [0], [0]])
  })
})

describe('bands of chains', () => {
  it('joins collinear qubits of a chain into one band over the span their couplers use', () => {
    const { bands, joints, spans } = chainGeometry(
      HAND_DRAWN,
      layerOf(
        [[0, 1], [3], [4]],
        [
          [0, 1],
          [0, 2],
        ],
      ),
    )
    expect(joints.map(({ kind }) => kind)).toEqual(['join'])
    expect(spans.map(({ qubit }) => qubit)).toEqual([0, 1, 3, 4])
    const band = bands.find(({ chain }) => chain === 0)!
    expect(band.qubits).toEqual([0, 1])
    expect([band.x1, band.x2]).toEqual([expect.closeTo(1 - over, 5), expect.closeTo(5 + over, 5)])
    expect([band.y1, band.y2]).toEqual([0, 0])
  })

  it('marks crossings and bridges of a chain', () => {
    const { joints } = chainGeometry(HAND_DRAWN, layerOf([[0, 2, 4]], []))
    expect(joints.map(({ kind, coupler }) => [kind, coupler])).toEqual([
      ['crossing', 4],
      ['bridge', 5],
    ])
  })

  it('gives a qubit without any used coupler a short span at its middle', () => {
    const { spans } = chainGeometry(HAND_DRAWN, layerOf([[2]], []))
    expect([spans[0]!.x1, spans[0]!.x2]).toEqual([expect.closeTo(3 - over, 5), expect.closeTo(3 + over, 5)])
  })

  it('covers every used coupler of a real machine', () => {
    const data = latticeOf({ kind: 'pegasus', m: 3, trimmed: true })
    const chains = layerOf(
      Array.from({ length: 20 }, (_, i) => [3 * i, 3 * i + 1]),
      Array.from({ length: 19 }, (_, i) => [i, i + 1]),
    )
    const { spans, roles } = chainGeometry(data, chains)
    for (const coupler of [...roles.chainCouplers, ...roles.interactionCouplers])
      for (const end of [0, 1]) {
        const span = spans.find(({ qubit }) => qubit === data.ends[2 * coupler + end])!
        const x = data.places[4 * coupler + 2 * end]!
        const y = data.places[4 * coupler + 2 * end + 1]!
        expect(x).toBeGreaterThanOrEqual(Math.min(span.x1, span.x2) - 1e-4)
        expect(x).toBeLessThanOrEqual(Math.max(span.x1, span.x2) + 1e-4)
        expect(y).toBeGreaterThanOrEqual(Math.min(span.y1, span.y2) - 1e-4)
        expect(y).toBeLessThanOrEqual(Math.max(span.y1, span.y2) + 1e-4)
      }
  })
})

describe('places of couplers', () => {
  it('agrees with the engine for every coupler of three families', () => {
    for (const family of [
      { kind: 'chimera', m: 2, n: 2, t: 4 },
      { kind: 'pegasus', m: 3, trimmed: true },
      { kind: 'zephyr', m: 2, t: 2 },
      { kind: 'king', width: 3, height: 3 },
    ] as const) {
      const data = latticeOf(family)
      for (let c = 0; 2 * c < data.ends.length; c++) {
        const own = placesOfPair(data.segments, data.ends[2 * c]!, data.ends[2 * c + 1]!)
        own.forEach((value, k) => expect(value).toBeCloseTo(data.places[4 * c + k]!, 4))
      }
    }
  })
})

describe('hues of chains', () => {
  it('weighs adjacent lines over second lines over shared couplers', () => {
    const chains = layerOf(
      [[0, 1], [2], [4]],
      [
        [0, 2],
        [1, 2],
      ],
    )
    const { roles, bands } = chainGeometry(HAND_DRAWN, chains)
    const { pairs, weights } = hueConflicts(HAND_DRAWN, roles, bands)
    const found = Array.from(weights, (weight, k) => [pairs[2 * k], pairs[2 * k + 1], weight])
    expect(found).toContainEqual([0, 1, HUE_WEIGHTS.adjacentLine])
    expect(found).toContainEqual([0, 2, HUE_WEIGHTS.sharedCoupler])
    expect(found).toHaveLength(3)
  })

  it('tells chains on neighbouring lines apart, on lines and on lattices of points', () => {
    const lines = huesOfChains(HAND_DRAWN, layerOf([[0, 1], [2]], []))
    expect(lines.hue[0]).not.toBe(lines.hue[1])
    const points = huesOfChains(latticeOf({ kind: 'king', width: 2, height: 2 }), layerOf([[0], [1], [2], [3]], []))
    expect(new Set(points.hue).size).toBe(4)
  })
})
