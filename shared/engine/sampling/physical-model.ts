import type { Programmed } from '../programming/programme'
import { createRandom, STREAMS } from '../random'

/**
 * An Ising model laid out for sampling: E(s) = Σ h_i s_i + Σ J_ij s_i s_j. Neighbours of spin i are
 * targets[offsets[i] … offsets[i + 1] − 1] with couplings `weights`, each coupling stored from both ends.
 */
export interface SamplerModel {
  readonly n: number
  readonly h: Float64Array
  readonly offsets: Uint32Array
  readonly targets: Uint32Array
  readonly weights: Float64Array
}

/** Fields with a list of couplings: coupling c joins ends[2c] and ends[2c + 1]. */
export interface CouplingList {
  readonly h: Float64Array
  readonly ends: Uint32Array
  readonly J: Float64Array
}

/** Gaussian control error in programmed units, drawn once: the same seed gives the same machine. */
export interface ModelError {
  readonly sigmaH: number
  readonly sigmaJ: number
  readonly seed: number
}

/**
 * Lays out fields and couplings for the sampler.
 * @throws RangeError for an end outside the spins or a coupling of a spin with itself
 */
export function samplerModel({ h, ends, J }: CouplingList): SamplerModel {
  const n = h.length
  const offsets = new Uint32Array(n + 1)
  for (let c = 0; c < J.length; c++) {
    const a = ends[2 * c]!
    const b = ends[2 * c + 1]!
    if (a >= n || b >= n || a === b) throw new RangeError(`coupling ${c} joins spins ${a} and ${b} of ${n}`)
    offsets[a + 1]!++
    offsets[b + 1]!++
  }
  for (let i = 0; i < n; i++) offsets[i + 1]! += offsets[i]!
  const targets = new Uint32Array(offsets[n]!)
  const weights = new Float64Array(offsets[n]!)
  const next = offsets.slice(0, n)
  for (let c = 0; c < J.length; c++) {
    for (let side = 0; side < 2; side++) {
      const slot = next[ends[2 * c + side]!]!++
      targets[slot] = ends[2 * c + 1 - side]!
      weights[slot] = J[c]!
    }
  }
  return { n, h: h.slice(), offsets, targets, weights }
}

/**
 * The programmed problem as the sampler sees it, with independent Gaussian control error on every field and coupling
 * where asked (King & McGeoch, arXiv:1410.2628, 2014).
 * @throws RangeError for a negative σ
 */
export function physicalModel(programmed: Programmed, error: ModelError | null = null): SamplerModel {
  if (!error) return samplerModel(programmed)
  if (!(error.sigmaH >= 0 && error.sigmaJ >= 0))
    throw new RangeError(`control error must not be negative: ${error.sigmaH}, ${error.sigmaJ}`)
  const random = createRandom(error.seed, STREAMS.controlError)
  return samplerModel({
    h: programmed.h.map((field) => field + error.sigmaH * random.normal()),
    ends: programmed.ends,
    J: programmed.J.map((J) => J + error.sigmaJ * random.normal()),
  })
}

/** The same model with its spins renumbered: new spin k is old spin order[k]. */
export function renumbered(model: SamplerModel, order: Uint32Array): SamplerModel {
  const { n, h, offsets, targets, weights } = model
  const placeOf = new Uint32Array(n)
  order.forEach((old, k) => (placeOf[old] = k))
  const moved = {
    n,
    h: Float64Array.from(order, (old) => h[old]!),
    offsets: new Uint32Array(n + 1),
    targets: new Uint32Array(targets.length),
    weights: new Float64Array(weights.length),
  }
  for (let k = 0; k < n; k++) {
    const from = offsets[order[k]!]!
    const degree = offsets[order[k]! + 1]! - from
    const start = moved.offsets[k]!
    for (let p = 0; p < degree; p++) {
      moved.targets[start + p] = placeOf[targets[from + p]!]!
      moved.weights[start + p] = weights[from + p]!
    }
    moved.offsets[k + 1] = start + degree
  }
  return moved
}
