import { describe, expect, it } from 'vitest'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import type { Fabric } from '../../../../shared/engine/machine/fabric'
import { bounds, couplerKind, couplerPlace, orientationOf } from '../../../../shared/engine/machine/layout'

const FABRICS = [
  buildFabric({ kind: 'chimera', m: 3, n: 2, t: 4 }),
  buildFabric({ kind: 'pegasus', m: 3, trimmed: true }),
  buildFabric({ kind: 'zephyr', m: 2, t: 4 }),
  buildFabric({ kind: 'king', width: 4, height: 3 }),
]

/** Distance from a point to a drawn qubit, by projecting and clamping. */
function distanceTo({ segments }: Fabric, q: number, x: number, y: number): number {
  const [x0, y0, x1, y1] = [...segments.subarray(4 * q, 4 * q + 4)] as [number, number, number, number]
  const length = (x1 - x0) ** 2 + (y1 - y0) ** 2
  const share = length === 0 ? 0 : ((x - x0) * (x1 - x0) + (y - y0) * (y1 - y0)) / length
  const clamped = Math.min(1, Math.max(0, share))
  return Math.hypot(x - x0 - clamped * (x1 - x0), y - y0 - clamped * (y1 - y0))
}

describe('couplerPlace', () => {
  it.each(FABRICS.map((fabric) => [fabric.family.kind, fabric] as const))(
    'puts each end on its own qubit, as near to the other qubit as can be: %s',
    (_, fabric) => {
      const place = new Float32Array(4)
      const apart = { internal: 0, external: 0.4, odd: 1, lattice: 1 } as const
      for (let edge = 0; edge < fabric.graph.ends.length / 2; edge++) {
        const [a, b] = [fabric.graph.ends[2 * edge]!, fabric.graph.ends[2 * edge + 1]!]
        const [xa, ya, xb, yb] = [...couplerPlace(fabric, edge, place)] as [number, number, number, number]
        expect(distanceTo(fabric, a, xa, ya)).toBeLessThan(1e-5)
        expect(distanceTo(fabric, b, xb, yb)).toBeLessThan(1e-5)
        const expected = apart[couplerKind(fabric, edge)]
        expect(Math.max(Math.abs(xa - xb), Math.abs(ya - yb))).toBeCloseTo(expected, 4)
        expect(distanceTo(fabric, b, xa, ya)).toBeCloseTo(Math.hypot(xa - xb, ya - yb), 4)
      }
    },
  )

  it('finds the facing ends whichever qubit comes first along the line', () => {
    const graph = graphFromEdges(2, [0, 1])
    const [left, right] = [
      [0, 5, 2, 5],
      [3, 5, 6, 5],
    ] as const
    const place = (...qubits: (readonly number[])[]): number[] => [
      ...couplerPlace({ graph, segments: Float32Array.from(qubits.flat()) }, 0, new Float32Array(4)),
    ]
    expect(place(left, right)).toEqual([2, 5, 3, 5])
    expect(place(right, left)).toEqual([3, 5, 2, 5])
  })

  it('returns the array it was given', () => {
    const out = new Float32Array(4)
    expect(couplerPlace(FABRICS[0]!, 0, out)).toBe(out)
  })

  it('places the three kinds in Z(1,1) where the drawing shows them', () => {
    const fabric = buildFabric({ kind: 'zephyr', m: 1, t: 1 })
    const place = (edge: number): number[] => [...couplerPlace(fabric, edge, new Float32Array(4))]
    // Qubit 0 stands at x = 0 over lines 0 to 3, its partner 1 at x = 1 over lines 2 to 5: the overlap is 1.7 to 3.3.
    const kinds = Array.from({ length: fabric.graph.ends.length / 2 }, (_, k) => couplerKind(fabric, k))
    expect(kinds[0]).toBe('odd')
    expect(place(0)).toEqual([0, 2.5, 1, 2.5].map((v) => expect.closeTo(v, 5) as number))
    expect(kinds[1]).toBe('internal')
    expect(place(1)).toEqual([0, 0, 0, 0])
  })
})

describe('couplerKind', () => {
  it('counts internal, external and odd couplers as the closed forms do', () => {
    const count = (fabric: Fabric) => {
      const counts = { internal: 0, external: 0, odd: 0, lattice: 0 }
      for (let edge = 0; edge < fabric.graph.ends.length / 2; edge++) counts[couplerKind(fabric, edge)]++
      return counts
    }
    // C(3,2,4): mnt² within cells, t·n(m − 1) + t·m(n − 1) between them.
    expect(count(FABRICS[0]!)).toEqual({ internal: 96, external: 16 + 12, odd: 0, lattice: 0 })
    // P(3) trimmed: 144(m − 1)², 24m(m − 2) − 8(m − 2), 12m(m − 1) − 4(m − 1).
    expect(count(FABRICS[1]!)).toEqual({ internal: 576, external: 64, odd: 64, lattice: 0 })
    // Z(2,4): 16m²t², 4t(2m + 1)(m − 1), 2t(4m² − 1).
    expect(count(FABRICS[2]!)).toEqual({ internal: 1024, external: 80, odd: 120, lattice: 0 })
    expect(count(FABRICS[3]!)).toEqual({ internal: 0, external: 0, odd: 0, lattice: 29 })
  })
})

describe('bounds and orientationOf', () => {
  it('holds every end, and touches some on each side', () => {
    for (const fabric of FABRICS) {
      const { left, top, right, bottom } = bounds(fabric)
      const xs = [...fabric.segments].filter((_, k) => k % 2 === 0)
      const ys = [...fabric.segments].filter((_, k) => k % 2 === 1)
      expect([left, right]).toEqual([Math.min(...xs), Math.max(...xs)])
      expect([top, bottom]).toEqual([Math.min(...ys), Math.max(...ys)])
    }
  })

  it('tells vertical, horizontal and point qubits apart by the published numbering', () => {
    const [chimera, pegasus, zephyr, king] = FABRICS as [Fabric, Fabric, Fabric, Fabric]
    chimera.ids.forEach((id, q) =>
      expect(orientationOf(chimera, q)).toBe(Math.floor(id / 4) % 2 === 0 ? 'vertical' : 'horizontal'),
    )
    pegasus.ids.forEach((id, q) => expect(orientationOf(pegasus, q)).toBe(id < 72 ? 'vertical' : 'horizontal'))
    zephyr.ids.forEach((id, q) => expect(orientationOf(zephyr, q)).toBe(id < 80 ? 'vertical' : 'horizontal'))
    king.ids.forEach((_, q) => expect(orientationOf(king, q)).toBe('point'))
  })
})
