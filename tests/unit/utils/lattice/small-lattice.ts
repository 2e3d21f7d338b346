import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../../../shared/engine/machine/fabric'
import { couplerPlace } from '../../../../shared/engine/machine/layout'
import type { ChainLayer, LatticeData } from '../../../../utils/lattice/types'

/** A whole machine of a family, as the lattice drawing gets it. */
export function latticeOf(family: PublishedFamily): LatticeData {
  const fabric = buildFabric(family)
  const { ends } = fabric.graph
  const places = new Float32Array(2 * ends.length)
  for (let c = 0; 2 * c < ends.length; c++) places.set(couplerPlace(fabric, c, new Float32Array(4)), 4 * c)
  return {
    ids: fabric.ids,
    segments: fabric.segments,
    usable: new Uint8Array(fabric.ids.length).fill(1),
    ends,
    places,
  }
}

export function layerOf(chains: number[][], neighbours: [number, number][]): ChainLayer {
  const offsets = new Uint32Array(chains.length + 1)
  chains.forEach((chain, i) => (offsets[i + 1] = offsets[i]! + chain.length))
  return {
    labels: chains.map((_, i) => `v${i}`),
    offsets,
    qubits: Uint32Array.from(chains.flat()),
    neighbours: Uint32Array.from(neighbours.flat()),
  }
}

/**
 * Two level lines (y = 0, 1) of two qubits each and two upright ones (x = 1, 5), drawn by hand:
 * 0: (0,0)–(2,0) · 1: (3,0)–(6,0) · 2: (0,1)–(6,1) · 3: x = 1, y −1…2 · 4: x = 5, y −1…2
 */
export const HAND_DRAWN: LatticeData = {
  ids: Uint32Array.of(10, 11, 12, 13, 14),
  segments: Float32Array.of(0, 0, 2, 0, 3, 0, 6, 0, 0, 1, 6, 1, 1, -1, 1, 2, 5, -1, 5, 2),
  usable: Uint8Array.of(1, 1, 1, 1, 1),
  // external 0–1, crossings 0–3, 1–4, 2–3, 2–4, odd 0–2
  ends: Uint32Array.of(0, 1, 0, 3, 1, 4, 2, 3, 2, 4, 0, 2),
  places: Float32Array.of(2, 0, 3, 0, 1, 0, 1, 0, 5, 0, 5, 0, 1, 1, 1, 1, 5, 1, 5, 1, 1, 0, 1, 1),
}

/** A small seeded generator, enough for test inputs. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 4294967296
  }
}
