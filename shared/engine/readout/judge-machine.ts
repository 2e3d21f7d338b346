import { edgeBetween } from '../graph/build'
import type { Graph } from '../graph/graph'
import { couplerPlace } from '../machine/layout'
import type { PartBreaks, PartCounts } from './part-breaks'
import type { Judgement, ReturnParts } from './suspects'
import { judgeParts } from './suspects'

export interface BreaksOnMachine {
  readonly graph: Graph
  /** Where the qubits lie, four numbers each (`Fabric.segments`). */
  readonly segments: Float32Array
  /** One entry a return; those of one embedding have the same number. */
  readonly returns: readonly (PartBreaks & { readonly embedding: number })[]
}

export interface JudgedMachine {
  readonly reads: number
  /** Dense indices, ascending, in step with the judged parts. */
  readonly qubits: Judgement & { readonly qubit: Uint32Array }
  /** Pairs of dense indices, ascending. */
  readonly couplers: Judgement & { readonly ends: Uint32Array }
}

/** All keys that occur, ascending, and the place of each. */
function placesOf(keys: readonly ArrayLike<number>[]): { all: Float64Array; placeOf: Map<number, number> } {
  const distinct = new Set<number>()
  for (const list of keys) for (let k = 0; k < list.length; k++) distinct.add(list[k]!)
  const all = Float64Array.from(distinct).sort()
  return { all, placeOf: new Map(Array.from(all, (key, place) => [key, place])) }
}

const partsOf = (
  { reads, embedding }: BreaksOnMachine['returns'][number],
  { chain, breaks, pull }: PartCounts,
  keys: ArrayLike<number>,
  placeOf: ReadonlyMap<number, number>,
): ReturnParts => ({
  chain,
  breaks,
  pull,
  reads,
  embedding,
  part: Uint32Array.from(keys, (key) => placeOf.get(key)!),
})

function judgeCouplers({ graph, segments, returns }: BreaksOnMachine): JudgedMachine['couplers'] {
  const { order } = graph
  const keysOf = (ends: Uint32Array): Float64Array =>
    Float64Array.from({ length: ends.length / 2 }, (_, k) => ends[2 * k]! * order + ends[2 * k + 1]!)
  const keys = returns.map(({ couplers }) => keysOf(couplers.ends))
  const { all, placeOf } = placesOf(keys)
  const [x, y] = [new Float64Array(all.length), new Float64Array(all.length)]
  const ends = new Uint32Array(2 * all.length)
  const at = new Float32Array(4)
  all.forEach((key, place) => {
    const [a, b] = [Math.floor(key / order), key % order]
    ends.set([a, b], 2 * place)
    couplerPlace({ graph, segments }, edgeBetween(graph, a, b), at)
    x[place] = (at[0]! + at[2]!) / 2
    y[place] = (at[1]! + at[3]!) / 2
  })
  const parts = returns.map((one, r) => partsOf(one, one.couplers, keys[r]!, placeOf))
  return { ...judgeParts({ x, y, returns: parts }), ends }
}

/**
 * Chains of a return that hold a suspected coupler: it puts whole pieces of its chain on the lesser side, so nothing
 * there is held against their qubits.
 */
function chainsWithSuspects({ couplers }: PartBreaks, suspects: ReadonlySet<number>, order: number): Set<number> {
  const { ends, chain } = couplers
  return new Set(chain.filter((_, k) => suspects.has(ends[2 * k]! * order + ends[2 * k + 1]!)))
}

function judgeQubits({ graph, segments, returns }: BreaksOnMachine, couplers: JudgedMachine['couplers']) {
  const suspects = new Set<number>()
  couplers.parts.forEach(({ suspect }, k) => {
    if (suspect) suspects.add(couplers.ends[2 * k]! * graph.order + couplers.ends[2 * k + 1]!)
  })
  const { all, placeOf } = placesOf(returns.map(({ qubits }) => qubits.qubit))
  const middle = (q: number, axis: 0 | 1): number => (segments[4 * q + axis]! + segments[4 * q + 2 + axis]!) / 2
  const parts = returns.map((counts) => {
    const clouded = chainsWithSuspects(counts, suspects, graph.order)
    const given = partsOf(counts, counts.qubits, counts.qubits.qubit, placeOf)
    return { ...given, left: given.chain.map((chain) => (clouded.has(chain) ? 1 : 0)) }
  })
  const judged = judgeParts({
    x: all.map((q) => middle(q, 0)),
    y: all.map((q) => middle(q, 1)),
    returns: parts,
  })
  return { ...judged, qubit: Uint32Array.from(all) }
}

/**
 * Breaks of every qubit and coupler of a machine over several returns, each part beside its neighbours: couplers first,
 * then the qubits of chains without a suspected coupler.
 */
export function judgeMachine(input: BreaksOnMachine): JudgedMachine {
  const couplers = judgeCouplers(input)
  return {
    reads: input.returns.reduce((sum, { reads }) => sum + reads, 0),
    qubits: judgeQubits(input, couplers),
    couplers,
  }
}
