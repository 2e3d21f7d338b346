import { describe, expect, it } from 'vitest'
import { coupledTo, machineGraphOf } from '../../../../utils/lattice/machine-graph'
import { pathBetweenChains } from '../../../../utils/lattice/path'
import type { ChainPath } from '../../../../utils/lattice/path'
import { HAND_DRAWN, latticeOf, seeded } from './small-lattice'

const row = (couplers: number[][], qubits: number) => ({
  ids: Uint32Array.from({ length: qubits }, (_, q) => q),
  ends: Uint32Array.from(couplers.flat()),
})
const find = (couplers: number[][], owner: number[], missing: number[] = []): ChainPath =>
  pathBetweenChains({
    machine: machineGraphOf(row(couplers, owner.length)),
    usable: Uint8Array.from(owner, (_, q) => (missing.includes(q) ? 0 : 1)),
    owner: Int32Array.from(owner),
    from: 0,
    to: 1,
  })

/** Fewest couplers, and among paths of that length fewest used qubits, by trying every simple path. */
function bySimplePaths(
  couplers: number[][],
  owner: number[],
  mayPass: (q: number) => boolean,
): [number, number] | null {
  let best: [number, number] | null = null
  const walk = (at: number, seen: number[], uses: number): void => {
    for (const pair of couplers) {
      if (!pair.includes(at)) continue
      const next = pair[0] === at ? pair[1]! : pair[0]!
      if (owner[next] === 1) {
        const score: [number, number] = [seen.length, uses]
        if (!best || score[0] < best[0] || (score[0] === best[0] && score[1] < best[1])) best = score
      } else if (!seen.includes(next) && mayPass(next)) walk(next, [...seen, next], uses + (owner[next]! >= 0 ? 1 : 0))
    }
  }
  owner.forEach((chain, q) => chain === 0 && walk(q, [q], 0))
  return best
}

describe('machineGraphOf', () => {
  it('lists both ends of every coupler', () => {
    const machine = machineGraphOf(HAND_DRAWN)
    expect([...coupledTo(machine, 0)].sort()).toEqual([1, 2, 3])
    expect([...coupledTo(machine, 4)].sort()).toEqual([1, 2])
  })
})

describe('pathBetweenChains', () => {
  it('names every coupler of chains that touch', () => {
    expect(
      find(
        [
          [0, 1],
          [0, 2],
          [2, 3],
        ],
        [0, 1, 0, 1],
      ),
    ).toEqual({
      kind: 'touching',
      couplers: [
        [0, 1],
        [2, 3],
      ],
    })
  })

  it('prefers a longer way through free qubits to a shorter one through used ones', () => {
    const couplers = [
      [0, 1],
      [1, 5],
      [0, 2],
      [2, 3],
      [3, 4],
      [4, 5],
    ]
    expect(find(couplers, [0, 2, -1, -1, -1, 1])).toEqual({
      kind: 'apart',
      between: [2, 3, 4],
      used: [],
      couplers: [
        [0, 2],
        [2, 3],
        [3, 4],
        [4, 5],
      ],
    })
    expect(find(couplers, [0, 2, -1, -1, -1, 1], [3])).toMatchObject({ between: [1], used: [1] })
    expect(find(couplers, [0, 2, -1, -1, -1, 1], [1, 3])).toEqual({ kind: 'none' })
  })

  it('agrees with trying every path on small random machines', () => {
    const random = seeded(7)
    let through = 0
    for (let round = 0; round < 300; round++) {
      const couplers: number[][] = []
      for (let a = 0; a < 8; a++) for (let b = a + 1; b < 8; b++) if (random() < 0.24) couplers.push([a, b])
      const owner = [0, 1, ...Array.from({ length: 6 }, () => (random() < 0.6 ? 2 : -1))]
      if (couplers.some(([a, b]) => a === 0 && b === 1)) continue
      const free = bySimplePaths(couplers, owner, (q) => owner[q]! < 0)
      const any = free ?? bySimplePaths(couplers, owner, (q) => owner[q] !== 0)
      const path = find(couplers, owner)
      if (!any) {
        expect(path).toEqual({ kind: 'none' })
        continue
      }
      if (!free) through++
      expect(path.kind === 'apart' && [path.couplers.length, path.used.length]).toEqual(any)
    }
    expect(through).toBeGreaterThan(20)
  })

  it('finds its way across a whole machine', () => {
    const lattice = latticeOf({ kind: 'zephyr', m: 3, t: 4 })
    const owner = new Int32Array(lattice.ids.length).fill(-1)
    owner[0] = 0
    owner[lattice.ids.length - 1] = 1
    const path = pathBetweenChains({ machine: machineGraphOf(lattice), usable: lattice.usable, owner, from: 0, to: 1 })
    if (path.kind !== 'apart') throw new Error('they lie apart')
    const line = [0, ...path.between, lattice.ids.length - 1]
    expect(path.couplers).toEqual(line.slice(1).map((q, i) => [line[i], q]))
    const couplers = new Set(
      Array.from({ length: lattice.ends.length / 2 }, (_, k) => `${lattice.ends[2 * k]},${lattice.ends[2 * k + 1]}`),
    )
    for (const [a, b] of path.couplers) expect(couplers.has(`${Math.min(a, b)},${Math.max(a, b)}`)).toBe(true)
  })
})
