import { describe, expect, it } from 'vitest'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import type { Fabric, PublishedFamily } from '../../../../../shared/engine/machine/fabric'

const point = ({ segments }: Fabric, q: number): [number, number] => [segments[4 * q]!, segments[4 * q + 1]!]

/** Distance of point p from the stretch between a and b, ends included. */
function distance([px, py]: [number, number], [ax, ay]: [number, number], [bx, by]: [number, number]): number {
  const length = (bx - ax) ** 2 + (by - ay) ** 2
  const t = Math.min(1, Math.max(0, ((px - ax) * (bx - ax) + (py - ay) * (by - ay)) / length))
  return Math.hypot(px - ax - t * (bx - ax), py - ay - t * (by - ay))
}

const FAMILIES: PublishedFamily[] = [
  { kind: 'cubic', width: 4, height: 3, depth: 3 },
  { kind: 'cubic', width: 2, height: 4, depth: 5 },
  { kind: 'cubic', width: 5, height: 2, depth: 3 },
  { kind: 'cubic', width: 3, height: 4, depth: 1 },
  { kind: 'heavy-hex', rows: 3, columns: 2 },
  { kind: 'heavy-hex', rows: 2, columns: 3 },
]

describe('drawings of lattices', () => {
  it.each(FAMILIES)('keep qubits at least 1 apart and off the couplers of others: %o', (family) => {
    const fabric = buildFabric(family)
    const { graph } = fabric
    for (let a = 0; a < graph.order; a++)
      for (let b = a + 1; b < graph.order; b++) {
        const [[ax, ay], [bx, by]] = [point(fabric, a), point(fabric, b)]
        expect(Math.hypot(ax - bx, ay - by)).toBeGreaterThan(0.999)
      }
    for (let k = 0; k < graph.ends.length; k += 2)
      for (let q = 0; q < graph.order; q++) {
        const [a, b] = [graph.ends[2 * (k / 2)]!, graph.ends[2 * (k / 2) + 1]!]
        if (q !== a && q !== b)
          expect(distance(point(fabric, q), point(fabric, a), point(fabric, b))).toBeGreaterThan(0.7)
      }
  })

  it('the couplers between the layers of a cubic grid are its only slanting ones', () => {
    const fabric = buildFabric({ kind: 'cubic', width: 4, height: 3, depth: 2 })
    const slanting = Array.from({ length: fabric.graph.ends.length / 2 }, (_, k) => {
      const [a, b] = [fabric.graph.ends[2 * k]!, fabric.graph.ends[2 * k + 1]!]
      const [[ax, ay], [bx, by]] = [point(fabric, a), point(fabric, b)]
      return [b - a === 12, ax !== bx && ay !== by]
    })
    for (const [isBetween, isSlanting] of slanting) expect(isSlanting).toBe(isBetween)
  })

  it('heavy hexagons have couplers of one length', () => {
    const fabric = buildFabric({ kind: 'heavy-hex', rows: 3, columns: 3 })
    for (let k = 0; k < fabric.graph.ends.length; k += 2) {
      const [[ax, ay], [bx, by]] = [point(fabric, fabric.graph.ends[k]!), point(fabric, fabric.graph.ends[k + 1]!)]
      expect(Math.hypot(ax - bx, ay - by)).toBeCloseTo(1, 5)
    }
  })
})
