import { describe, expect, it } from 'vitest'
import { findEmbedding } from '../../../../shared/engine/embedding/search'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import { geometryOf } from '../../../../shared/engine/machine/geometry'
import { programme } from '../../../../shared/engine/programming/programme'
import type { Programmed } from '../../../../shared/engine/programming/programme'
import { createRandom } from '../../../../shared/engine/random'
import { judgeMachine } from '../../../../shared/engine/readout/judge-machine'
import { breakStatistics } from '../../../../shared/engine/readout/breaks'
import { partBreaks } from '../../../../shared/engine/readout/part-breaks'
import { anneal } from '../../../../shared/engine/sampling/anneal'
import { physicalModel } from '../../../../shared/engine/sampling/physical-model'
import { isingOf, must, wideRanges } from '../programming/instances'

const fabric = buildFabric({ kind: 'pegasus', m: 4, trimmed: true })
const usable = new Uint8Array(fabric.ids.length).fill(1)

/** A random problem on the machine, held by chains that are too weak. */
function programmedAt(seed: number): Programmed {
  const random = createRandom(seed)
  const n = 34
  const pairs: [number, number, number][] = []
  for (let i = 0; i < n; i++)
    for (let j = i + 1; j < n; j++) if (random.float() < 0.4) pairs.push([i, j, random.float() < 0.5 ? 1 : -1])
  const graph = graphFromEdges(
    n,
    pairs.flatMap(([i, j]) => [i, j]),
  )
  const task = { problem: graph, machine: fabric.graph, usable, ...geometryOf(fabric), start: null }
  const { embedding } = findEmbedding(task, { method: 'lines', seed, tries: 1 }, control)
  const strengths = new Float64Array(n).fill(1.6)
  const usual = { fieldSplit: 'even', interactionCouplers: 'all', chainCouplers: 'all', ranges: wideRanges } as const
  const ising = isingOf(new Array<number>(n).fill(0), pairs)
  return must(programme({ ...usual, ising, machine: fabric.graph, embedding: must(embedding), strengths }).programmed)
}

const control = { now: () => 0, cancelled: () => false, report: () => {} }

/** Samples of what the machine makes of it: the coupler given, if any, holds with a part of its strength only. */
function returned(programmed: Programmed, seed: number, bad?: number) {
  const J = programmed.J.map((value, c) => (c === bad ? 0.25 * value : value))
  const options = { firstRead: 0, reads: 400, sweeps: 40, temperature: 0.35, seed }
  const samples = anneal(physicalModel({ ...programmed, J }, null), options, control)
  return partBreaks(breakStatistics({ samples, programmed }), programmed)
}

const judged = (returns: ReturnType<typeof returned>[]) =>
  judgeMachine({
    graph: fabric.graph,
    segments: fabric.segments,
    returns: returns.map((one, embedding) => ({ ...one, embedding })),
  })

const keysOf = (ends: ArrayLike<number>) =>
  Array.from({ length: ends.length / 2 }, (_, k) => `${ends[2 * k]}-${ends[2 * k + 1]}`)
const suspectsIn = ({ ends, parts }: ReturnType<typeof judged>['couplers']) =>
  keysOf(ends).filter((_, k) => parts[k]!.suspect)

/** Place of a coupler of the machine among those of a programme, −1 where it is not one inside a chain. */
const placeIn = ({ qubits, ends, isChainCoupler }: Programmed, key: string): number =>
  keysOf(Array.from(ends, (p) => qubits[p]!)).findIndex((own, c) => own === key && isChainCoupler[c] === 1)

const SEEDS = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10]

describe('judgeMachine', () => {
  const programmes = SEEDS.map(programmedAt)
  const clean = programmes.map((programmed, k) => returned(programmed, k))

  /** With one coupler of the machine bad in every programme that uses it. */
  const spoilt = (key: string) =>
    judged(
      programmes.map((programmed, k) => {
        const coupler = placeIn(programmed, key)
        return coupler < 0 ? clean[k]! : returned(programmed, k, coupler)
      }),
    )

  it.each(['48-49', '201-202'])('finds the coupler %s when it holds with a quarter of its strength', (key) => {
    const { couplers, reads } = spoilt(key)
    expect(suspectsIn(couplers)).toEqual([key])
    const row = keysOf(couplers.ends).indexOf(key)
    const least = Math.min(...couplers.parts.map(({ q }) => q ?? 1))
    expect(couplers.parts[row]!.q).toBe(least)
    expect(reads).toBe(4000)
  })

  it('accuses no part of a machine on which nothing is bad', () => {
    const { couplers, qubits } = judged(clean)
    expect([...couplers.parts, ...qubits.parts].filter(({ suspect }) => suspect)).toEqual([])
    expect(couplers.tested).toBeGreaterThan(200)
  })

  it('counts each part over the returns that used it', () => {
    const { couplers, qubits } = judged(clean)
    keysOf(couplers.ends).forEach((key, row) => {
      const uses = clean.flatMap(({ couplers: own }) => {
        const k = keysOf(own.ends).indexOf(key)
        return k < 0 ? [] : [own.breaks[k]!]
      })
      expect(couplers.parts[row]).toMatchObject({ total: 400 * uses.length, count: uses.reduce((a, b) => a + b, 0) })
    })
    expect([...qubits.qubit]).toEqual([...qubits.qubit].sort((a, b) => a - b))
  })

  it('holds nothing against the qubits of a chain with a suspected coupler', () => {
    const before = judged(clean).qubits
    const after = spoilt('48-49').qubits
    const neighboursOf = (set: typeof before, qubit: number) => set.parts[set.qubit.indexOf(qubit)]!.neighbours
    expect(neighboursOf(before, 48)).toBeGreaterThan(0)
    expect(neighboursOf(after, 48)).toBe(0)
  })
})
