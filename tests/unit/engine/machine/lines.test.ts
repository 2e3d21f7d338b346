import { describe, expect, it } from 'vitest'
import { edgeBetween } from '../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import { applyDefects } from '../../../../shared/engine/machine/defects'
import type { Fabric, PublishedFamily } from '../../../../shared/engine/machine/fabric'
import { orientationOf } from '../../../../shared/engine/machine/layout'
import { intactRuns, linesOf } from '../../../../shared/engine/machine/lines'
import type { Lines, Runs } from '../../../../shared/engine/machine/lines'
import { createRandom } from '../../../../shared/engine/random'

const FAMILIES: readonly PublishedFamily[] = [
  { kind: 'chimera', m: 3, n: 5, t: 4 },
  { kind: 'chimera', m: 2, n: 2, t: 1 },
  { kind: 'pegasus', m: 3, trimmed: true },
  { kind: 'pegasus', m: 4, trimmed: false },
  { kind: 'zephyr', m: 3, t: 4 },
  { kind: 'zephyr', m: 1, t: 2 },
]

const linesOfFabric = (family: PublishedFamily): Lines => linesOf(buildFabric(family).segments)!

const itemsOf = ({ offsets, qubits }: Lines | Runs, i: number): number[] => [
  ...qubits.subarray(offsets[i]!, offsets[i + 1]!),
]

const lengthsOf = (lines: Lines): Set<number> =>
  new Set(Array.from({ length: lines.count }, (_, line) => itemsOf(lines, line).length))

/** Pieces by flood fill over couplers between qubits of one orientation and one place across, smallest qubit first. */
function floodedRuns({ segments }: Fabric, graph: Fabric['graph'], usable: Uint8Array): string[] {
  const across = (q: number): number => {
    const horizontal = orientationOf({ segments }, q) === 'horizontal'
    return segments[4 * q + (horizontal ? 1 : 0)]! + (horizontal ? 1e6 : 0)
  }
  const seen = new Set<number>()
  const runs: string[] = []
  for (let start = 0; start < graph.order; start++) {
    if (usable[start] === 0 || seen.has(start)) continue
    const piece = [start]
    seen.add(start)
    for (const q of piece)
      for (let r = 0; r < graph.order; r++) {
        if (seen.has(r) || across(r) !== across(q) || edgeBetween(graph, q, r) < 0) continue
        seen.add(r)
        piece.push(r)
      }
    runs.push(piece.sort((a, b) => a - b).join())
  }
  return runs.sort()
}

describe('linesOf', () => {
  it('finds n·t vertical lines of m qubits and m·t horizontal ones of n in C(m,n,t)', () => {
    const lines = linesOfFabric({ kind: 'chimera', m: 3, n: 5, t: 4 })
    expect([lines.verticals, lines.count - lines.verticals]).toEqual([20, 12])
    for (let line = 0; line < lines.count; line++) expect(itemsOf(lines, line)).toHaveLength(line < 20 ? 3 : 5)
  })

  it('finds 12m lines of m − 1 qubits in each direction of P(m), 4 fewer when trimmed', () => {
    const whole = linesOfFabric({ kind: 'pegasus', m: 4, trimmed: false })
    expect([whole.verticals, whole.count]).toEqual([48, 96])
    expect(lengthsOf(whole)).toEqual(new Set([3]))
    const trimmed = linesOfFabric({ kind: 'pegasus', m: 4, trimmed: true })
    expect([trimmed.verticals, trimmed.count]).toEqual([44, 88])
    expect(lengthsOf(trimmed)).toEqual(new Set([3]))
  })

  it('finds 2t(2m + 1) lines of m qubits in each direction of Z(m,t)', () => {
    const lines = linesOfFabric({ kind: 'zephyr', m: 3, t: 4 })
    expect([lines.verticals, lines.count]).toEqual([56, 112])
    expect(lengthsOf(lines)).toEqual(new Set([3]))
  })

  it.each(FAMILIES)('sorts lines, and qubits along them: $kind', (family) => {
    const fabric = buildFabric(family)
    const lines = linesOf(fabric.segments)!
    for (let line = 0; line < lines.count; line++) {
      const horizontal = line >= lines.verticals
      const first = line === 0 || line === lines.verticals
      if (!first) expect(lines.across[line]).toBeGreaterThan(lines.across[line - 1]!)
      itemsOf(lines, line).forEach((q, place, line_) => {
        expect(orientationOf(fabric, q)).toBe(horizontal ? 'horizontal' : 'vertical')
        expect(fabric.segments[4 * q + (horizontal ? 1 : 0)]).toBe(lines.across[line])
        expect([lines.lineOf[q], lines.placeOf[q]]).toEqual([line, place])
        if (place > 0) expect(edgeBetween(fabric.graph, line_[place - 1]!, q)).toBeGreaterThanOrEqual(0)
      })
    }
    expect([...lines.qubits].sort((a, b) => a - b)).toEqual(Array.from(fabric.ids.keys()))
  })

  it('knows no lines without a drawing, among points, and where segments lean', () => {
    expect(linesOf(null)).toBeNull()
    expect(linesOf(buildFabric({ kind: 'king', width: 3, height: 3 }).segments)).toBeNull()
    expect(linesOf(Float32Array.from([0, 0, 0, 2, 0, 0, 3, 2]))).toBeNull()
  })
})

describe('intactRuns', () => {
  it.each(FAMILIES)('leaves intact lines whole: $kind', (family) => {
    const { graph, segments } = buildFabric(family)
    const lines = linesOf(segments)!
    const runs = intactRuns(lines, graph, new Uint8Array(graph.order).fill(1))
    expect([...runs.offsets]).toEqual([...lines.offsets])
    expect([...runs.qubits]).toEqual([...lines.qubits])
    expect([...runs.lineOf]).toEqual(Array.from({ length: lines.count }, (_, line) => line))
  })

  it.each(FAMILIES)('cuts at random defects as a flood fill does: $kind', (family) => {
    const fabric = buildFabric(family)
    const random = createRandom(7)
    const qubits = [...fabric.ids].filter(() => random.float() < 0.1)
    const couplers: [number, number][] = []
    for (let k = 0; k < fabric.graph.ends.length; k += 2)
      if (random.float() < 0.2)
        couplers.push([fabric.ids[fabric.graph.ends[k]!]!, fabric.ids[fabric.graph.ends[k + 1]!]!])
    const { graph, usable } = applyDefects(fabric, { qubits, couplers })
    const lines = linesOf(fabric.segments)!
    const runs = intactRuns(lines, graph, usable)
    const found = Array.from({ length: runs.count }, (_, run) => itemsOf(runs, run))
    expect(found.map((run) => [...run].sort((a, b) => a - b).join()).sort()).toEqual(floodedRuns(fabric, graph, usable))
    found.forEach((run, r) =>
      run.forEach((q, i) => {
        expect([runs.runOf[q], runs.lineOf[r]]).toEqual([r, lines.lineOf[q]])
        if (i > 0) expect(lines.placeOf[q]).toBe(lines.placeOf[run[i - 1]!]! + 1)
      }),
    )
    expect(runs.runOf.reduce((count, run) => count + (run < 0 ? 1 : 0), 0)).toBe(
      usable.filter((works) => !works).length,
    )
  })
})
