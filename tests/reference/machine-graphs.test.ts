import { describe, expect, it } from 'vitest'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import { applyDefects } from '../../shared/engine/machine/defects'
import type { Fabric, PublishedFamily } from '../../shared/engine/machine/fabric'
import { couplerCount, qubitCount } from '../../shared/engine/machine/family'

/** Couplers of a fabric as sorted `a-b` texts of published numbers, lower first. */
const couplersOf = ({ graph, ids }: Pick<Fabric, 'graph' | 'ids'>): string[] =>
  Array.from({ length: graph.ends.length / 2 }, (_, k) => `${ids[graph.ends[2 * k]!]}-${ids[graph.ends[2 * k + 1]!]}`)

const written = (a: number, b: number): string => (a < b ? `${a}-${b}` : `${b}-${a}`)
const upTo = (n: number): number[] => Array.from({ length: n }, (_, k) => k)
const expectSame = (found: string[], expected: Iterable<string>): void =>
  expect([...found].sort()).toEqual([...expected].sort())

function degrees({ graph }: Fabric): number[] {
  const count = new Array<number>(graph.order).fill(0)
  for (const end of graph.ends) count[end]!++
  return count
}

// Bunyk et al. 2014: cells (i, j) of K_{t,t}; side u = 0 is joined to the same place of the cells above and below,
// side u = 1 to that of the cells left and right. Every pair of qubits is tried against this definition.
function chimeraByDefinition(m: number, n: number, t: number): string[] {
  const all = upTo(m).flatMap((i) =>
    upTo(n).flatMap((j) =>
      upTo(2).flatMap((u) => upTo(t).map((k) => ({ i, j, u, k, id: ((i * n + j) * 2 + u) * t + k }))),
    ),
  )
  const couplers: string[] = []
  for (const a of all)
    for (const b of all) {
      if (a.id >= b.id) continue
      const sameCell = a.i === b.i && a.j === b.j && a.u !== b.u
      const samePlace = a.u === b.u && a.k === b.k
      const above = samePlace && a.u === 0 && a.j === b.j && Math.abs(a.i - b.i) === 1
      const beside = samePlace && a.u === 1 && a.i === b.i && Math.abs(a.j - b.j) === 1
      if (sameCell || above || beside) couplers.push(written(a.id, b.id))
    }
  return couplers
}

// arXiv:2003.00133, the formulaic description: qubits (u, w, k, z); external (u,w,k,z)–(u,w,k,z+1); odd
// (u,w,2j,z)–(u,w,2j+1,z); internal (0,w,k,z)–(1, z + [κ < a_k], κ, w − [k < b_κ]), where it exists.
function pegasusByDefinition(m: number): { couplers: string[]; crossed: Set<number> } {
  const a = [2, 2, 2, 2, 10, 10, 10, 10, 6, 6, 6, 6]
  const b = [6, 6, 6, 6, 2, 2, 2, 2, 10, 10, 10, 10]
  const id = (u: number, w: number, k: number, z: number): number => z + (m - 1) * (k + 12 * (w + m * u))
  const couplers: string[] = []
  const crossed = new Set<number>()
  for (const w of upTo(m))
    for (const k of upTo(12))
      for (const z of upTo(m - 1)) {
        for (const u of upTo(2)) {
          if (z + 1 < m - 1) couplers.push(written(id(u, w, k, z), id(u, w, k, z + 1)))
          if (k % 2 === 0) couplers.push(written(id(u, w, k, z), id(u, w, k + 1, z)))
        }
        for (const kappa of upTo(12)) {
          const row = z + (kappa < a[k]! ? 1 : 0)
          const along = w - (k < b[kappa]! ? 1 : 0)
          if (along < 0 || along >= m - 1) continue
          couplers.push(written(id(0, w, k, z), id(1, row, kappa, along)))
          crossed.add(id(0, w, k, z)).add(id(1, row, kappa, along))
        }
      }
  return { couplers, crossed }
}

// Zephyr report (Boothby, King & Raymond 2021): qubits (u, w, k, j, z), w ≤ 2m; external between z and z + 1 of equal
// j; odd (u,w,k,0,z)–(u,w,k,1,z) and (u,w,k,1,z)–(u,w,k,0,z+1); internal (0,w,k,j,z)–(1,w',k',j',z') where
// w' ∈ {2z + j, 2z + j + 1} and w ∈ {2z' + j', 2z' + j' + 1}.
function zephyrByDefinition(m: number, t: number): string[] {
  const id = (u: number, w: number, k: number, j: number, z: number): number =>
    (((u * (2 * m + 1) + w) * t + k) * 2 + j) * m + z
  const couplers: string[] = []
  const tracks = upTo(2 * m + 1).flatMap((w) => upTo(t).map((k) => [w, k] as const))
  for (const [w, k] of tracks)
    for (const z of upTo(m)) {
      for (const u of upTo(2)) {
        couplers.push(written(id(u, w, k, 0, z), id(u, w, k, 1, z)))
        if (z + 1 === m) continue
        couplers.push(written(id(u, w, k, 1, z), id(u, w, k, 0, z + 1)))
        for (const j of upTo(2)) couplers.push(written(id(u, w, k, j, z), id(u, w, k, j, z + 1)))
      }
      for (const j of upTo(2))
        for (const [row, place] of tracks)
          for (const half of upTo(2 * m)) {
            if (row !== 2 * z + j && row !== 2 * z + j + 1) continue
            if (w !== half && w !== half + 1) continue
            couplers.push(written(id(0, w, k, j, z), id(1, row, place, half % 2, Math.floor(half / 2))))
          }
    }
  return couplers
}

describe('published counts', () => {
  it.each<[PublishedFamily, number, number]>([
    // Bunyk et al. 2014: the machine of 16 by 16 cells.
    [{ kind: 'chimera', m: 16, n: 16, t: 4 }, 2048, 6016],
    // The machines of 8 by 8 and of 12 by 12 cells before it: 512 and 1152 qubits; couplers from the closed form.
    [{ kind: 'chimera', m: 8, n: 8, t: 4 }, 512, 1472],
    [{ kind: 'chimera', m: 12, n: 12, t: 4 }, 1152, 3360],
    // arXiv:2003.00133: 24m(m − 1) qubits in all, 8(3m − 1)(m − 1) in the trimmed fabric.
    [{ kind: 'pegasus', m: 16, trimmed: false }, 5760, 40656],
    [{ kind: 'pegasus', m: 16, trimmed: true }, 5640, 40484],
    [{ kind: 'pegasus', m: 6, trimmed: true }, 680, 4484],
    // Zephyr report: 4tm(2m + 1) qubits, 2t((8t + 8)m² − 2m − 3) couplers.
    [{ kind: 'zephyr', m: 15, t: 4 }, 7440, 71736],
    [{ kind: 'zephyr', m: 6, t: 4 }, 1248, 11400],
    // King's graph W×H: WH vertices, 4WH − 3(W + H) + 2 edges.
    [{ kind: 'king', width: 320, height: 320 }, 102400, 407682],
    // Square grid W×H: WH vertices, 2WH − W − H edges.
    [{ kind: 'square', width: 70, height: 33 }, 2310, 4517],
    // Cubic grid n×n×n: n³ vertices, 3n²(n − 1) edges; the box 12×10×8 by lines along each axis: 11·80 + 9·96 + 7·120.
    [{ kind: 'cubic', width: 15, height: 15, depth: 15 }, 3375, 9450],
    [{ kind: 'cubic', width: 46, height: 46, depth: 46 }, 97336, 285660],
    [{ kind: 'cubic', width: 12, height: 10, depth: 8 }, 960, 2584],
    // Honeycombs of benzene, naphthalene, pyrene's outline 2×2: 6, 10, 16 corners and 6, 11, 19 sides, with a qubit each.
    [{ kind: 'heavy-hex', rows: 1, columns: 1 }, 12, 12],
    [{ kind: 'heavy-hex', rows: 1, columns: 2 }, 21, 22],
    [{ kind: 'heavy-hex', rows: 2, columns: 2 }, 35, 38],
  ])('%o has the published size', (family, qubits, couplers) => {
    const { graph } = buildFabric(family)
    expect([graph.order, graph.ends.length / 2]).toEqual([qubits, couplers])
    expect([qubitCount(family), couplerCount(family)]).toEqual([qubits, couplers])
  })

  it('gives the degrees that the papers state', () => {
    // Chimera: t + 2 inside. Pegasus: 15 = 12 internal + 2 external + 1 odd. Zephyr: 4t + 4. King's graph: 8.
    expect(Math.max(...degrees(buildFabric({ kind: 'chimera', m: 4, n: 4, t: 4 })))).toBe(6)
    const pegasus = degrees(buildFabric({ kind: 'pegasus', m: 16, trimmed: true }))
    expect(Math.max(...pegasus)).toBe(15)
    // All but the outermost lines have the 12 crossings, 12(m − 2) + 4 each way; all but the outermost z both neighbours.
    expect(pegasus.filter((degree) => degree === 15).length).toBe(2 * (12 * 14 + 4) * 13)
    for (const t of [1, 2, 4, 6]) expect(Math.max(...degrees(buildFabric({ kind: 'zephyr', m: 4, t })))).toBe(4 * t + 4)
    const king = degrees(buildFabric({ kind: 'king', width: 9, height: 7 }))
    expect([3, 5, 8].map((degree) => king.filter((d) => d === degree).length)).toEqual([4, 2 * 7 + 2 * 5, 7 * 5])
    // Cubic grid: 3 at corners, 4 along edges, 5 on faces, 6 inside. Heavy hexagons: at most 3, on corners alone.
    const cubic = degrees(buildFabric({ kind: 'cubic', width: 5, height: 6, depth: 7 }))
    expect([3, 4, 5, 6].map((degree) => cubic.filter((d) => d === degree).length)).toEqual([8, 48, 94, 60])
    // Corners have two or three sides, so those with three are twice the sides less twice the corners.
    const hexagons = degrees(buildFabric({ kind: 'heavy-hex', rows: 4, columns: 5 }))
    const [corners, sides] = [2 * 5 * 6 - 2, 3 * 20 + 8 + 10 - 1]
    expect(hexagons.filter((d) => d === 3).length).toBe(2 * sides - 2 * corners)
    expect(Math.max(...hexagons)).toBe(3)
  })
})

describe('published adjacency and numbering', () => {
  it.each([
    [1, 1, 4],
    [3, 5, 4],
    [4, 2, 3],
    [2, 3, 1],
  ])('C(%i,%i,%i) is the definition', (m, n, t) => {
    expectSame(couplersOf(buildFabric({ kind: 'chimera', m, n, t })), chimeraByDefinition(m, n, t))
  })

  it.each([2, 3, 6, 16])('P(%i) is the definition, and trimming removes exactly the uncrossed qubits', (m) => {
    const { couplers, crossed } = pegasusByDefinition(m)
    const whole = buildFabric({ kind: 'pegasus', m, trimmed: false })
    expectSame(couplersOf(whole), couplers)
    expect([...whole.ids]).toEqual(upTo(24 * m * (m - 1)))
    const trimmed = buildFabric({ kind: 'pegasus', m, trimmed: true })
    expect([...trimmed.ids]).toEqual([...crossed].sort((a, b) => a - b))
    const isLeft = (pair: string): boolean => pair.split('-').every((id) => crossed.has(Number(id)))
    expectSame(couplersOf(trimmed), couplers.filter(isLeft))
  })

  it.each([
    [1, 1],
    [1, 4],
    [2, 3],
    [4, 4],
  ])('Z(%i,%i) is the definition', (m, t) => {
    const fabric = buildFabric({ kind: 'zephyr', m, t })
    expectSame(couplersOf(fabric), zephyrByDefinition(m, t))
    expect([...fabric.ids]).toEqual(upTo(4 * t * m * (2 * m + 1)))
  })

  it('keeps the published numbers of the trimmed P(16): 30 to 5729', () => {
    // Lines k = 0 and 1 of tile w = 0 cross nothing, so the first number left is z + 15·k = 2·15, and the last mirrors it.
    const { ids } = buildFabric({ kind: 'pegasus', m: 16, trimmed: true })
    expect([ids[0], ids.at(-1)]).toEqual([30, 24 * 16 * 15 - 1 - 30])
  })

  it.each([2, 3, 16])('the trimmed P(%i) is one connected part', (m) => {
    const { graph } = buildFabric({ kind: 'pegasus', m, trimmed: true })
    const root = upTo(graph.order)
    const find = (v: number): number => (root[v] === v ? v : (root[v] = find(root[v]!)))
    for (let k = 0; k < graph.ends.length; k += 2) root[find(graph.ends[k]!)] = find(graph.ends[k + 1]!)
    expect(new Set(upTo(graph.order).map(find)).size).toBe(1)
  })
})

/** Checks that `image` maps couplers to couplers, one to one. */
function expectAutomorphism(fabric: Fabric, image: (id: number) => number): void {
  const mapped = couplersOf(fabric).map((pair) => {
    const [a, b] = pair.split('-').map(Number) as [number, number]
    return written(image(a), image(b))
  })
  expect(new Set(mapped).size).toBe(mapped.length)
  expectSame(mapped, couplersOf(fabric))
}

describe('symmetries', () => {
  it('C(m,n,t) turned by a quarter is C(n,m,t)', () => {
    const [m, n, t] = [3, 5, 4]
    const turned = couplersOf(buildFabric({ kind: 'chimera', m, n, t })).map((pair) => {
      const [a, b] = pair.split('-').map((text) => {
        const id = Number(text)
        const [cell, u, k] = [Math.floor(id / (2 * t)), Math.floor(id / t) % 2, id % t]
        return (((cell % n) * m + Math.floor(cell / n)) * 2 + (1 - u)) * t + k
      }) as [number, number]
      return written(a, b)
    })
    expectSame(turned, couplersOf(buildFabric({ kind: 'chimera', m: n, n: m, t })))
  })

  it('P(m) maps to itself under (u, w, k, z) → (1 − u, m − 1 − w, 11 − k, m − 2 − z)', () => {
    // The two offset lists are each other's mirror image: 12 − a reversed is b.
    const m = 5
    for (const trimmed of [false, true])
      expectAutomorphism(buildFabric({ kind: 'pegasus', m, trimmed }), (id) => {
        const [z, k, w] = [id % (m - 1), Math.floor(id / (m - 1)) % 12, Math.floor(id / 12 / (m - 1)) % m]
        const u = id < 12 * m * (m - 1) ? 0 : 1
        return m - 2 - z + (m - 1) * (11 - k + 12 * (m - 1 - w + m * (1 - u)))
      })
  })

  it('Z(m,t) maps to itself when orientations are swapped, and when tracks of a row are permuted', () => {
    const [m, t] = [3, 4]
    const fabric = buildFabric({ kind: 'zephyr', m, t })
    const half = fabric.ids.length / 2
    expectAutomorphism(fabric, (id) => (id + half) % (2 * half))
    expectAutomorphism(fabric, (id) => {
      const k = Math.floor(id / (2 * m)) % t
      return id + (((k + 1) % t) - k) * 2 * m
    })
  })

  it('square grid and king graph map to themselves under a mirror', () => {
    for (const kind of ['king', 'square'] as const)
      expectAutomorphism(buildFabric({ kind, width: 6, height: 4 }), (id) => id + 5 - 2 * (id % 6))
  })
})

/** Whether every vertex of `left` is joined to every vertex of `right`. */
function isBiclique(couplers: Set<string>, left: number[], right: number[]): boolean {
  return left.every((a) => right.every((b) => couplers.has(written(a, b))))
}

describe('subgraphs that the papers name', () => {
  it('every Chimera cell is a K_{t,t} with no couplers within a side', () => {
    const fabric = buildFabric({ kind: 'chimera', m: 3, n: 3, t: 4 })
    const couplers = new Set(couplersOf(fabric))
    for (const cell of upTo(9)) {
      const [left, right] = [upTo(4).map((k) => 8 * cell + k), upTo(4).map((k) => 8 * cell + 4 + k)]
      expect(isBiclique(couplers, left, right)).toBe(true)
      for (const side of [left, right])
        for (const a of side) for (const b of side) expect(couplers.has(written(a, b))).toBe(false)
    }
  })

  it('P(m) holds three disjoint Chimera graphs C(m − 1, m − 1, 4)', () => {
    // arXiv:2003.00133: Pegasus as three Chimera layers, each of four vertical and four horizontal lines a tile. A layer
    // is [first vertical k, first horizontal k, tile of the first column, tile of the first row].
    const m = 5
    const couplers = new Set(couplersOf(buildFabric({ kind: 'pegasus', m, trimmed: true })))
    const id = (u: number, w: number, k: number, z: number): number => z + (m - 1) * (k + 12 * (w + m * u))
    const layers = [
      [0, 8, 1, 0],
      [4, 4, 0, 1],
      [8, 0, 0, 1],
    ] as const
    const used = new Set<number>()
    for (const [down, across, w0, row0] of layers) {
      const number = (i: number, j: number, u: number, k: number): number =>
        u === 0 ? id(0, j + w0, down + k, i) : id(1, i + row0, across + k, j)
      const cells = upTo(m - 1).flatMap((i) => upTo(m - 1).map((j) => [i, j] as const))
      const numbers = cells.flatMap(([i, j]) => upTo(2).flatMap((u) => upTo(4).map((k) => number(i, j, u, k))))
      for (const pair of chimeraByDefinition(m - 1, m - 1, 4)) {
        const [a, b] = pair.split('-').map((text) => numbers[Number(text)]!) as [number, number]
        expect(couplers.has(written(a, b))).toBe(true)
      }
      for (const qubit of numbers) used.add(qubit)
    }
    expect(used.size).toBe(24 * (m - 1) * (m - 1))
  })

  it('Pegasus has K_4 at pairs of partners, and K_{6,6}', () => {
    // Abstract of arXiv:2003.00133. Columns 14 to 19 and rows 16 to 21 of P(4), read off the offset lists.
    const m = 4
    const couplers = new Set(couplersOf(buildFabric({ kind: 'pegasus', m, trimmed: true })))
    const id = (u: number, w: number, k: number, z: number): number => z + (m - 1) * (k + 12 * (w + m * u))
    const partners = [id(0, 1, 4, 0), id(0, 1, 5, 0), id(1, 1, 4, 1), id(1, 1, 5, 1)]
    for (const a of partners) for (const b of partners) if (a !== b) expect(couplers.has(written(a, b))).toBe(true)
    const columns = [2, 3, 4, 5, 6, 7].map((k) => id(0, 1, k, k < 4 ? 1 : 0))
    const rows = [4, 5, 6, 7, 8, 9].map((k) => id(1, 1, k, k < 8 ? 1 : 0))
    expect(isBiclique(couplers, columns, rows)).toBe(true)
  })

  it('Zephyr Z(m,4) has K_4 and K_{8,8}', () => {
    // Zephyr report: the eight qubits a side whose two staggered rows meet at (1, 1).
    const [m, t] = [2, 4]
    const couplers = new Set(couplersOf(buildFabric({ kind: 'zephyr', m, t })))
    const id = (u: number, w: number, k: number, j: number, z: number): number =>
      (((u * (2 * m + 1) + w) * t + k) * 2 + j) * m + z
    const side = (u: number): number[] => upTo(4).flatMap((k) => [id(u, 1, k, 0, 0), id(u, 1, k, 1, 0)])
    expect(isBiclique(couplers, side(0), side(1))).toBe(true)
    const partners = [side(0)[0]!, side(0)[1]!, side(1)[0]!, side(1)[1]!]
    for (const a of partners) for (const b of partners) if (a !== b) expect(couplers.has(written(a, b))).toBe(true)
  })
})

describe('defects', () => {
  it('a machine without a qubit is the family graph with the vertex deleted', () => {
    const fabric = buildFabric({ kind: 'zephyr', m: 2, t: 4 })
    const all = zephyrByDefinition(2, 4)
    const missing = [0, 37, 159]
    const broken: [number, number] = [1, Number(all.find((pair) => pair.startsWith('1-'))!.split('-')[1])]
    const { graph, usable } = applyDefects(fabric, { qubits: missing, couplers: [broken] })
    const expected = all.filter(
      (pair) => pair !== written(...broken) && !pair.split('-').some((id) => missing.includes(Number(id))),
    )
    expectSame(couplersOf({ graph, ids: fabric.ids }), expected)
    expect(upTo(usable.length).filter((q) => usable[q] === 0)).toEqual(missing)
  })
})
