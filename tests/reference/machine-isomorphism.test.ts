import { describe, expect, it } from 'vitest'
import { familyTreewidth } from '../../shared/engine/embedding/bounds/family-treewidth'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import type { Neighbours } from '../support/isomorphism'
import { graphBy, isIsomorphic, neighboursOf } from '../support/isomorphism'

// Small machines compared with constructions that share neither code, coordinates nor numbering with the engine, by an
// exact test of isomorphism.

const upTo = (n: number): number[] => Array.from({ length: n }, (_, k) => k)

function built(family: PublishedFamily): Neighbours {
  const { graph } = buildFabric(family)
  return neighboursOf(
    graph.order,
    upTo(graph.ends.length / 2).map((k) => [graph.ends[2 * k]!, graph.ends[2 * k + 1]!] as const),
  )
}

const pathOf = (n: number): Neighbours => graphBy(upTo(n), (a, b) => b - a === 1)

/** Pairs (a, b) as a·|B| + b; joined when equal in one and joined in the other. */
function cartesian(a: Neighbours, b: Neighbours): Neighbours {
  return a.flatMap((aroundA, v) =>
    b.map((aroundB, w) => [...aroundA.map((u) => u * b.length + w), ...aroundB.map((u) => v * b.length + u)]),
  )
}

/** As the Cartesian product, and joined as well when joined in both (Sabidussi 1960). */
function strong(a: Neighbours, b: Neighbours): Neighbours {
  const along = cartesian(a, b)
  return along.map((around, place) => {
    const [v, w] = [Math.floor(place / b.length), place % b.length]
    return [...around, ...a[v]!.flatMap((u) => b[w]!.map((x) => u * b.length + x))]
  })
}

/** Every edge replaced by a path of two. */
function subdivided(graph: Neighbours): Neighbours {
  const edges = graph.flatMap((around, v) => around.filter((w) => w > v).map((w) => [v, w] as const))
  return neighboursOf(
    graph.length + edges.length,
    edges.flatMap(([v, w], k) => [[v, graph.length + k] as const, [graph.length + k, w] as const]),
  )
}

/** The corners and sides of hexagons given by their centres, two for each unit: corners meet where coordinates do. */
function honeycomb(centres: readonly (readonly [number, number])[]): Neighbours {
  // Corners of a pointed hexagon in steps of half a width across and half a side down.
  const outline = [
    [0, -2],
    [1, -1],
    [1, 1],
    [0, 2],
    [-1, 1],
    [-1, -1],
  ] as const
  const names = new Map<string, number>()
  const sides = new Map<string, readonly [number, number]>()
  for (const [x, y] of centres) {
    const corners = outline.map(([dx, dy]) => {
      const key = `${x + dx},${y + dy}`
      if (!names.has(key)) names.set(key, names.size)
      return names.get(key)!
    })
    corners.forEach((a, k) => {
      const b = corners[(k + 1) % 6]!
      sides.set(`${Math.min(a, b)}-${Math.max(a, b)}`, [a, b])
    })
  }
  return neighboursOf(names.size, sides.values())
}

/**
 * Chimera as cells: a cell is the join of two empty graphs of t, that is t stars sharing their leaves; equal places of
 * one side form a path down every column of cells, of the other side along every row.
 */
function chimeraOfCells(m: number, n: number, t: number): Neighbours {
  const edges: (readonly [number, number])[] = []
  const side = (cell: number, isAcross: boolean): number[] =>
    upTo(t).map((k) => (isAcross ? m * n * t : 0) + cell * t + k)
  for (const cell of upTo(m * n)) {
    for (const centre of side(cell, false)) for (const leaf of side(cell, true)) edges.push([centre, leaf])
    const [i, j] = [cell % m, Math.floor(cell / m)]
    if (i + 1 < m) side(cell, false).forEach((q, k) => edges.push([q, side(cell + 1, false)[k]!]))
    if (j + 1 < n) side(cell, true).forEach((q, k) => edges.push([q, side(cell + m, true)[k]!]))
  }
  return neighboursOf(2 * m * n * t, edges)
}

interface Wire {
  readonly isUpright: boolean
  readonly across: number
  readonly from: number
  readonly to: number
}

const parallel = (a: Wire, b: Wire): boolean => a.isUpright === b.isUpright
const crosses = (a: Wire, b: Wire): boolean =>
  !parallel(a, b) && a.from <= b.across && b.across <= a.to && b.from <= a.across && a.across <= b.to

/**
 * arXiv:2003.00133, the definition by wires: each of length 12 crossing lines. Wire (u, w, k, z) stands at 12w + k and
 * covers 12z + offset to 12z + offset + 11. Successive wires of a line and partners 2j, 2j + 1 are joined as well.
 */
function pegasusOfWires(m: number): Neighbours {
  const offsets = [
    [2, 10, 6],
    [6, 2, 10],
  ] as const
  const wires = upTo(2).flatMap((u) =>
    upTo(12 * m).flatMap((across) =>
      upTo(m - 1).map((z): Wire => {
        const from = 12 * z + offsets[u]![Math.floor((across % 12) / 4)]!
        return { isUpright: u === 0, across, from, to: from + 11 }
      }),
    ),
  )
  return graphBy(wires, (a, b) => {
    if (!parallel(a, b)) return crosses(a, b)
    const isSuccessive = a.across === b.across && Math.abs(a.from - b.from) === 12
    const isPartner =
      Math.floor(a.across / 2) === Math.floor(b.across / 2) && a.across !== b.across && a.from === b.from
    return isSuccessive || isPartner
  })
}

/**
 * Zephyr report, by wires: tracks of 2m + 1 rows, t a row, each with two staggered wires that cover two rows: wire
 * (u, w, k, j, z) covers rows 2z + j and 2z + j + 1. Every wire is joined to those it crosses, to the next two of its
 * track: those of the other stagger that overlap it by a row, and the successive one of its own.
 */
function zephyrOfWires(m: number, t: number): Neighbours {
  const wires = upTo(2).flatMap((u) =>
    upTo(2 * m + 1).flatMap((across) =>
      upTo(t).flatMap((k) => upTo(2 * m).map((from) => ({ isUpright: u === 0, across, k, from, to: from + 1 }))),
    ),
  )
  return graphBy(wires, (a, b) => {
    if (!parallel(a, b)) return crosses(a, b)
    const apart = Math.abs(a.from - b.from)
    return a.across === b.across && a.k === b.k && (apart === 1 || apart === 2)
  })
}

describe('isIsomorphic', () => {
  it('tells regular graphs apart that colours alone do not', () => {
    const hexagon = neighboursOf(
      6,
      upTo(6).map((v) => [v, (v + 1) % 6] as const),
    )
    const triangles = neighboursOf(6, [
      [0, 1],
      [1, 2],
      [2, 0],
      [3, 4],
      [4, 5],
      [5, 3],
    ])
    expect(isIsomorphic(hexagon, triangles)).toBe(false)
    const renamed = neighboursOf(
      6,
      upTo(6).map((v) => [(5 * v) % 6, (5 * v + 5) % 6] as const),
    )
    expect(isIsomorphic(hexagon, renamed)).toBe(true)
    // The 4×4 rook's graph and the Shrikhande graph: both strongly regular with the same parameters.
    const squares = upTo(16).map((v) => [Math.floor(v / 4), v % 4] as const)
    const rook = graphBy(squares, ([a, b], [c, d]) => a === c || b === d)
    const steps = new Set(['0,1', '0,3', '1,0', '3,0', '1,1', '3,3'])
    const shrikhande = graphBy(squares, ([a, b], [c, d]) => steps.has(`${(c - a + 4) % 4},${(d - b + 4) % 4}`))
    expect(isIsomorphic(rook, shrikhande)).toBe(false)
  })
})

describe('families are the independent constructions', () => {
  it.each([
    [1, 1, 1],
    [2, 3, 2],
    [3, 2, 4],
  ])('C(%i,%i,%i): cells of stars, joined along paths', (m, n, t) => {
    expect(isIsomorphic(built({ kind: 'chimera', m, n, t }), chimeraOfCells(m, n, t))).toBe(true)
    if (m !== n) expect(isIsomorphic(built({ kind: 'chimera', m, n, t }), chimeraOfCells(m, n, t + 1))).toBe(false)
  })

  it('C(m,n,1) with its cells contracted is a square grid', () => {
    const { graph } = buildFabric({ kind: 'chimera', m: 3, n: 4, t: 1 })
    const between = upTo(graph.ends.length / 2)
      .map((k) => [Math.floor(graph.ends[2 * k]! / 2), Math.floor(graph.ends[2 * k + 1]! / 2)] as const)
      .filter(([a, b]) => a !== b)
    expect(isIsomorphic(neighboursOf(12, between), cartesian(pathOf(3), pathOf(4)))).toBe(true)
  })

  it.each([
    [1, 5],
    [3, 3],
    [4, 6],
  ])('king’s graph %i×%i: strong product of two paths', (width, height) => {
    expect(isIsomorphic(built({ kind: 'king', width, height }), strong(pathOf(height), pathOf(width)))).toBe(true)
  })

  it.each([
    [1, 5],
    [4, 4],
    [3, 7],
  ])('square grid %i×%i: Cartesian product of two paths', (width, height) => {
    expect(isIsomorphic(built({ kind: 'square', width, height }), cartesian(pathOf(width), pathOf(height)))).toBe(true)
  })

  it.each([
    [1, 1, 6],
    [2, 2, 2],
    [3, 3, 3],
    [5, 2, 3],
  ])('cubic grid %i×%i×%i: Cartesian product of three paths', (width, height, depth) => {
    const product = cartesian(pathOf(depth), cartesian(pathOf(width), pathOf(height)))
    expect(isIsomorphic(built({ kind: 'cubic', width, height, depth }), product)).toBe(true)
  })

  it.each([
    [1, 1],
    [1, 4],
    [4, 1],
    [3, 3],
    [4, 3],
    [2, 5],
  ])('heavy hexagons %i×%i: every side of a honeycomb divided in two', (rows, columns) => {
    const centres = upTo(rows).flatMap((i) => upTo(columns).map((j) => [2 * j + (i % 2), 3 * i] as const))
    const comb = honeycomb(centres)
    expect(comb.length).toBe(2 * (rows + 1) * (columns + 1) - 2)
    expect(isIsomorphic(built({ kind: 'heavy-hex', rows, columns }), subdivided(comb))).toBe(true)
  })

  it.each([2, 3])('P(%i) untrimmed: crossing wires with partners', (m) => {
    expect(isIsomorphic(built({ kind: 'pegasus', m, trimmed: false }), pegasusOfWires(m))).toBe(true)
  })

  it('P(3) trimmed: the wires that cross others', () => {
    const wires = pegasusOfWires(3)
    // Upright wires come first, so crossing ones lie in the other half.
    const half = wires.length / 2
    const kept = upTo(wires.length).filter((v) => wires[v]!.some((w) => w < half !== v < half))
    const place = new Map(kept.map((v, i) => [v, i]))
    const induced = kept.map((v) => wires[v]!.flatMap((w) => place.get(w) ?? []))
    expect(isIsomorphic(built({ kind: 'pegasus', m: 3, trimmed: true }), induced)).toBe(true)
  })

  it.each([
    [1, 1],
    [1, 4],
    [2, 2],
    [3, 1],
  ])('Z(%i,%i): wires of two rows', (m, t) => {
    expect(isIsomorphic(built({ kind: 'zephyr', m, t }), zephyrOfWires(m, t))).toBe(true)
  })
})

describe('published bounds on complete-graph minors', () => {
  it('Chimera: at most K_{4m+1} for t = 4, by treewidth tm (Klymko, Sullivan & Humble 2014)', () => {
    for (const m of [1, 4, 8, 12, 16]) expect(familyTreewidth({ kind: 'chimera', m, n: m, t: 4 }) + 1).toBe(4 * m + 1)
  })

  it('no bound is below what published constructions place', () => {
    // K_{tm} on Chimera by chains of m + 1 (Choi 2011); about K_{12m − 10} on Pegasus, K_{16m − 8} on Zephyr with equal
    // chains (Boothby et al. 2020, 2021).
    for (const m of [2, 4, 8, 16]) {
      expect(familyTreewidth({ kind: 'chimera', m, n: m, t: 4 }) + 1).toBeGreaterThanOrEqual(4 * m)
      expect(familyTreewidth({ kind: 'pegasus', m, trimmed: true }) + 1).toBeGreaterThanOrEqual(12 * m - 10)
      expect(familyTreewidth({ kind: 'zephyr', m, t: 4 }) + 1).toBeGreaterThanOrEqual(16 * m - 8)
    }
  })

  it('square grid n×n: treewidth n exactly (from memory)', () => {
    for (const n of [2, 5, 9]) expect(familyTreewidth({ kind: 'square', width: n, height: n })).toBe(n)
  })
})
