import { assignHues } from '~/utils/hues'
import type { ChainHues, HueConflicts } from '~/utils/hues'
import type { Band } from './bands'
import { chainGeometry } from './geometry'
import type { Roles } from './roles'
import { axisOf } from './segments'
import type { ChainLayer, LatticeData } from './types'

export const HUE_WEIGHTS = { adjacentLine: 4, secondLine: 2, sharedCoupler: 1 }

/**
 * Chains that should not share a hue: those that run side by side on neighbouring lines, less so on second lines, and
 * those that share a coupler. The weight of a pair is the largest that applies.
 */
export function hueConflicts(data: LatticeData, roles: Roles, bands: readonly Band[]): HueConflicts {
  const weights = new Map<number, number>()
  const variables = 1 + bands.reduce((most, band) => Math.max(most, band.chain), -1)
  const note = (i: number, j: number, weight: number) => {
    if (i === j) return
    const key = Math.min(i, j) * variables + Math.max(i, j)
    weights.set(key, Math.max(weight, weights.get(key) ?? 0))
  }
  for (const coupler of roles.interactionCouplers)
    note(roles.owner[data.ends[2 * coupler]!]!, roles.owner[data.ends[2 * coupler + 1]!]!, HUE_WEIGHTS.sharedCoupler)
  for (const side of [false, true]) noteParallels(bands, side, note)

  const pairs = new Uint32Array(2 * weights.size)
  const values = new Float32Array(weights.size)
  let k = 0
  for (const [key, weight] of weights) {
    pairs[2 * k] = Math.floor(key / variables)
    pairs[2 * k + 1] = key % variables
    values[k++] = weight
  }
  return { pairs, weights: values }
}

function noteParallels(
  bands: readonly Band[],
  upright: boolean,
  note: (i: number, j: number, weight: number) => void,
): void {
  const strips = bands
    .filter((band) => Math.abs(band.x2 - band.x1) < Math.abs(band.y2 - band.y1) === upright)
    .map((band) =>
      upright
        ? { chain: band.chain, line: band.x1, low: Math.min(band.y1, band.y2), high: Math.max(band.y1, band.y2) }
        : { chain: band.chain, line: band.y1, low: Math.min(band.x1, band.x2), high: Math.max(band.x1, band.x2) },
    )
    .sort((a, b) => a.line - b.line)
  strips.forEach((strip, i) => {
    for (let j = i + 1; j < strips.length && strips[j]!.line - strip.line < 2.5; j++) {
      const other = strips[j]!
      if (other.low > strip.high || strip.low > other.high) continue
      note(strip.chain, other.chain, other.line - strip.line < 1.5 ? HUE_WEIGHTS.adjacentLine : HUE_WEIGHTS.secondLine)
    }
  })
}

/** Hues of all chains of an embedding, for the lattice, the ledger and the problem graph alike. */
export function huesOfChains(data: LatticeData, chains: ChainLayer): ChainHues {
  const { roles, bands } = chainGeometry(data, chains)
  const isPoints = roles.owner.every((_, qubit) => axisOf(data.segments, qubit).length === 0)
  const conflicts = hueConflicts(data, roles, isPoints ? [] : bands)
  return assignHues(chains.labels.length, isPoints ? couplerConflicts(data, roles) : conflicts)
}

/** On lattices of points no band runs beside another: every coupler between two chains makes them neighbours. */
function couplerConflicts(data: LatticeData, { owner }: Roles): HueConflicts {
  const pairs: number[] = []
  for (let c = 0; c < data.ends.length; c += 2) {
    const i = owner[data.ends[c]!]!
    const j = owner[data.ends[c + 1]!]!
    if (i >= 0 && j >= 0 && i !== j) pairs.push(i, j)
  }
  return { pairs: Uint32Array.from(pairs), weights: new Float32Array(pairs.length / 2).fill(HUE_WEIGHTS.adjacentLine) }
}
