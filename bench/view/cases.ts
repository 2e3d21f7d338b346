/**
 * Machines and embeddings that the view is measured on. Chains are grown from a seed, not searched for: what counts is
 * how much there is to draw.
 */
import { adjacency } from './adjacency'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../shared/engine/machine/fabric'
import { couplerPlace } from '../../shared/engine/machine/layout'
import { createRandom } from '../../shared/engine/random'
import type { Random } from '../../shared/engine/random'
import type { ChainLayer, LatticeData, LoadLayer } from '../../utils/lattice/types'

export interface ViewCase {
  readonly name: string
  readonly family: PublishedFamily
  readonly chains: number
  /** Least and most qubits of a chain. */
  readonly lengths: readonly [number, number]
  /** Largest median and largest single frame that are accepted, in milliseconds. */
  readonly bars: { readonly frame: number; readonly worst: number; readonly paint: number }
}

const SMOOTH = { frame: 33, worst: 100, paint: 1500 }

export const CASES: readonly ViewCase[] = [
  { name: 'zephyr-15', family: { kind: 'zephyr', m: 15, t: 4 }, chains: 200, lengths: [6, 22], bars: SMOOTH },
  {
    name: 'pegasus-16',
    family: { kind: 'pegasus', m: 16, trimmed: true },
    chains: 200,
    lengths: [6, 18],
    bars: SMOOTH,
  },
  {
    name: 'king-320',
    family: { kind: 'king', width: 320, height: 320 },
    chains: 2000,
    lengths: [4, 16],
    bars: { frame: 150, worst: 150, paint: 5000 },
  },
]

export interface BuiltCase {
  readonly data: LatticeData
  readonly chains: ChainLayer
  readonly load: LoadLayer
}

/** Share of qubits that do not work. */
const DEFECTS = 0.01

export function buildCase({ family, chains, lengths }: ViewCase, seed = 1): BuiltCase {
  const random = createRandom(seed)
  const fabric = buildFabric(family)
  const order = fabric.ids.length
  const usable = Uint8Array.from({ length: order }, () => (random.float() < DEFECTS ? 0 : 1))
  const working = Array.from({ length: fabric.graph.ends.length / 2 }, (_, c) => c).filter(
    (c) => usable[fabric.graph.ends[2 * c]!] && usable[fabric.graph.ends[2 * c + 1]!],
  )
  const ends = new Uint32Array(2 * working.length)
  const places = new Float32Array(4 * working.length)
  const place = new Float32Array(4)
  working.forEach((c, k) => {
    ends.set([fabric.graph.ends[2 * c]!, fabric.graph.ends[2 * c + 1]!], 2 * k)
    places.set(couplerPlace(fabric, c, place), 4 * k)
  })
  const data = { ids: fabric.ids, segments: fabric.segments, usable, ends, places }
  const load = { qubitLoad: Float32Array.from({ length: order }, () => random.float()) }
  return { data, chains: growChains(data, chains, lengths, random), load }
}

/** Chains grown one after the other from the middle outwards, each from a free qubit by free neighbours. */
function growChains(data: LatticeData, count: number, [least, most]: readonly [number, number], random: Random) {
  const around = adjacency(data.ids.length, data.ends)
  const owner = new Int32Array(data.ids.length).fill(-1)
  const chains: number[][] = []
  for (let attempt = 0; chains.length < count && attempt < 40 * count; attempt++) {
    const start = random.below(data.ids.length)
    if (!data.usable[start] || owner[start]! >= 0) continue
    const wanted = least + random.below(most - least + 1)
    const chain = [start]
    owner[start] = chains.length
    for (let step = 0; chain.length < wanted && step < 8 * wanted; step++) {
      const from = chain[Math.max(0, chain.length - 1 - random.below(3))]!
      const next =
        around.items[around.starts[from]! + random.below(around.starts[from + 1]! - around.starts[from]! || 1)]
      if (next === undefined || owner[next]! >= 0) continue
      owner[next] = chains.length
      chain.push(next)
    }
    chains.push(chain)
  }
  return layerOf(chains, owner, data.ends)
}

function layerOf(chains: number[][], owner: Int32Array, ends: Uint32Array): ChainLayer {
  const pairs = new Set<number>()
  for (let c = 0; c < ends.length; c += 2) {
    const [i, j] = [owner[ends[c]!]!, owner[ends[c + 1]!]!]
    if (i >= 0 && j >= 0 && i !== j) pairs.add(Math.min(i, j) * chains.length + Math.max(i, j))
  }
  const offsets = new Uint32Array(chains.length + 1)
  chains.forEach((chain, i) => (offsets[i + 1] = offsets[i]! + chain.length))
  return {
    labels: chains.map((_, i) => `v.${i + 1}`),
    offsets,
    qubits: Uint32Array.from(chains.flat()),
    neighbours: Uint32Array.from([...pairs].flatMap((key) => [Math.floor(key / chains.length), key % chains.length])),
  }
}
