import { packChains } from '../../../../shared/engine/embedding/embedding'
import type { Embedding } from '../../../../shared/engine/embedding/embedding'
import { graphFromEdges } from '../../../../shared/engine/graph/build'
import type { Graph } from '../../../../shared/engine/graph/graph'
import type { Problem } from '../../../../shared/engine/problem/problem'
import { createRandom } from '../../../../shared/engine/random'
import type { Random } from '../../../../shared/engine/random'

/** A small problem with an embedding that is valid by construction. */
export interface Instance {
  readonly machine: Graph
  readonly embedding: Embedding
  readonly ising: Problem
}

export const wideRanges = { h: [-100, 100], J: [-100, 100], couplingSum: null } as const

/** An Ising problem from [row, col, value] triples. */
export function isingOf(
  linear: readonly number[],
  pairs: readonly (readonly [number, number, number])[],
  offset = 0,
): Problem {
  const sorted = [...pairs].sort((a, b) => a[0] - b[0] || a[1] - b[1])
  return {
    n: linear.length,
    linear: Float64Array.from(linear),
    rows: Uint32Array.from(sorted, ([row]) => row),
    cols: Uint32Array.from(sorted, ([, col]) => col),
    values: Float64Array.from(sorted, ([, , value]) => value),
    offset,
  }
}

/** A path of `chain.length` qubits 0, 1, … as the machine's only couplers besides those given. */
export const pathWith = (length: number, order: number, extra: readonly number[]): Graph =>
  graphFromEdges(order, [...Array.from({ length: length - 1 }, (_, q) => [q, q + 1]).flat(), ...extra])

function growChain(machine: Graph, taken: Set<number>, size: number, random: Random): number[] {
  const free = Array.from({ length: machine.order }, (_, q) => q).filter((q) => !taken.has(q))
  const chain = [free[random.below(free.length)]!]
  taken.add(chain[0]!)
  while (chain.length < size) {
    const around = chain.flatMap((q) => [...machine.targets.subarray(machine.offsets[q]!, machine.offsets[q + 1]!)])
    const open = around.filter((q) => !taken.has(q))
    if (open.length === 0) break
    chain.push(open[random.below(open.length)]!)
    taken.add(chain[chain.length - 1]!)
  }
  return chain
}

/** Random connected chains on a random graph, with interactions between a part of the chains that touch. */
export function randomInstance(
  seed: number,
  options: { order: number; sizes: readonly number[]; density: number; field: number },
): Instance {
  const random = createRandom(seed)
  const { order, sizes, density, field } = options
  const ends: number[] = []
  for (let q = 1; q < order; q++) ends.push(random.below(q), q)
  for (let a = 0; a < order; a++) for (let b = a + 1; b < order; b++) if (random.float() < density) ends.push(a, b)
  const machine = graphFromEdges(order, ends)
  const taken = new Set<number>()
  const chains = sizes.map((size) => growChain(machine, taken, size, random))
  const owner = new Map(chains.flatMap((chain, i) => chain.map((q) => [q, i] as const)))
  const pairs = new Map<string, [number, number, number]>()
  for (let e = 0; e < machine.ends.length; e += 2) {
    const a = owner.get(machine.ends[e]!)
    const b = owner.get(machine.ends[e + 1]!)
    if (a === undefined || b === undefined || a === b || random.float() < 0.1) continue
    const value = Math.round((random.float() * 4 - 2) * 64) / 64 || 0.5
    pairs.set(`${Math.min(a, b)} ${Math.max(a, b)}`, [Math.min(a, b), Math.max(a, b), value])
  }
  const linear = sizes.map(() => field * (random.float() * 2 - 1))
  return {
    machine,
    embedding: packChains(chains),
    ising: isingOf(linear, [...pairs.values()], random.float() * 10 - 5),
  }
}

/** Energy of a logical state, term by term. */
export function logicalEnergy(ising: Problem, state: readonly number[]): number {
  let energy = ising.offset
  for (let i = 0; i < ising.n; i++) energy += ising.linear[i]! * state[i]!
  for (let k = 0; k < ising.values.length; k++)
    energy += ising.values[k]! * state[ising.rows[k]!]! * state[ising.cols[k]!]!
  return energy
}

/** Energy of a physical state, term by term. */
export function physicalEnergy(
  values: { readonly h: Float64Array; readonly ends: Uint32Array; readonly J: Float64Array },
  state: readonly number[],
): number {
  let energy = 0
  values.h.forEach((h, p) => (energy += h * state[p]!))
  values.J.forEach((J, c) => (energy += J * state[values.ends[2 * c]!]! * state[values.ends[2 * c + 1]!]!))
  return energy
}

/** All ±1 states of n spins. */
export function* statesOf(n: number): Generator<number[]> {
  for (let bits = 0; bits < 2 ** n; bits++) yield Array.from({ length: n }, (_, i) => ((bits >> i) & 1 ? 1 : -1))
}

/** A programmed problem must be there. */
export function must<T>(value: T | null): T {
  if (value === null) throw new Error('a value was expected')
  return value
}
