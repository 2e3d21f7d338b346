/**
 * A few Ising spins in a transverse field, H = −A/2 Σ σx_i + B/2 (Σ h_i σz_i + Σ J_ij σz_i σz_j), as an operator that is only
 * ever applied to vectors: the part with B is diagonal, the part with A flips one spin at a time.
 */
export interface SpinModel {
  /** Fields h_i, one a spin; dimensionless, as programmed. */
  readonly h: Float64Array
  /** Coupling c joins spins ends[2c] and ends[2c + 1] with J[c]. */
  readonly ends: Uint32Array
  readonly J: Float64Array
}

/** Beyond it vectors of 2ⁿ numbers and the time for them are no longer small. */
export const MOST_SPINS = 14

/**
 * Without fields H commutes with the flip of all spins, and its states are even or odd under it. The sector then holds
 * one state for each pair of opposite spin states, and `mirror` is the sign with which a state and its opposite go
 * together; 0 where the whole space is meant.
 */
export interface SpinOperator {
  readonly spins: number
  readonly size: number
  readonly mirror: -1 | 0 | 1
  /** Σ h_i s_i + Σ J_ij s_i s_j of each state; bit i of its index is 1 where spin i is up. */
  readonly classical: Float64Array
}

/** @throws RangeError for no spins, more than 14, an end outside them, or values that are not finite */
function requireModel({ h, ends, J }: SpinModel): void {
  const n = h.length
  if (n < 1 || n > MOST_SPINS) throw new RangeError(`the spectrum is worked out for 1 to ${MOST_SPINS} spins, not ${n}`)
  if (!h.every(Number.isFinite) || !J.every(Number.isFinite))
    throw new RangeError('fields and couplings must be finite')
  for (let c = 0; c < J.length; c++) {
    const [a, b] = [ends[2 * c]!, ends[2 * c + 1]!]
    if (a >= n || b >= n || a === b) throw new RangeError(`coupling ${c} joins spins ${a} and ${b} of ${n}`)
  }
}

/** Classical energies of states 0 … size − 1, each from the one without its highest bit. */
function classicalEnergies({ h, ends, J }: SpinModel, size: number): Float64Array {
  const n = h.length
  const fields = h.slice()
  const coupling = new Float64Array(n * n)
  let allDown = 0
  for (let i = 0; i < n; i++) allDown -= h[i]!
  for (let c = 0; c < J.length; c++) {
    const [a, b] = [ends[2 * c]!, ends[2 * c + 1]!]
    allDown += J[c]!
    coupling[a * n + b]! += J[c]!
    coupling[b * n + a]! += J[c]!
  }
  const energies = new Float64Array(size)
  energies[0] = allDown
  for (let i = 0; 1 << i < size; i++)
    for (let low = 0; low < 1 << i; low++) {
      // Raising spin i changes the energy by twice its local field, with the spins above it still down.
      let field = fields[i]!
      for (let j = 0; j < n; j++) field += coupling[i * n + j]! * (j < i && (low >> j) & 1 ? 1 : -1)
      energies[(1 << i) | low] = energies[low]! + 2 * field
    }
  return energies
}

/**
 * The operators whose levels together are the model's: one where there are fields, the even and the odd one without.
 * @throws RangeError for no spins, more than 14, an end outside them, or values that are not finite
 */
export function spinOperators(model: SpinModel): SpinOperator[] {
  requireModel(model)
  const spins = model.h.length
  if (model.h.some((field) => field !== 0)) {
    const size = 1 << spins
    return [{ spins, size, mirror: 0, classical: classicalEnergies(model, size) }]
  }
  const size = 1 << (spins - 1)
  const classical = classicalEnergies(model, size)
  return [
    { spins, size, mirror: 1, classical },
    { spins, size, mirror: -1, classical },
  ]
}

/** Takes a times the flips of the three spins at bits `bit`, 2·bit and 4·bit from y, eight states at a time. */
function flipThree(x: Float64Array, y: Float64Array, a: number, bit: number): void {
  const [two, four] = [2 * bit, 4 * bit]
  for (let base = 0; base < x.length; base += 2 * four)
    for (let k = base; k < base + bit; k++) {
      const [k1, k2, k3] = [k + bit, k + two, k + two + bit]
      const [k4, k5, k6, k7] = [k + four, k1 + four, k2 + four, k3 + four]
      const [x0, x1, x2, x3] = [x[k]!, x[k1]!, x[k2]!, x[k3]!]
      const [x4, x5, x6, x7] = [x[k4]!, x[k5]!, x[k6]!, x[k7]!]
      y[k]! -= a * (x1 + x2 + x4)
      y[k1]! -= a * (x0 + x3 + x5)
      y[k2]! -= a * (x3 + x0 + x6)
      y[k3]! -= a * (x2 + x1 + x7)
      y[k4]! -= a * (x5 + x6 + x0)
      y[k5]! -= a * (x4 + x7 + x1)
      y[k6]! -= a * (x7 + x4 + x2)
      y[k7]! -= a * (x6 + x5 + x3)
    }
}

function flipOne(x: Float64Array, y: Float64Array, a: number, bit: number): void {
  for (let base = 0; base < x.length; base += 2 * bit)
    for (let k = base; k < base + bit; k++) {
      const [low, high] = [x[k]!, x[k + bit]!]
      y[k]! -= a * high
      y[k + bit]! -= a * low
    }
}

/** Writes H·x into y; `a` = A/2 and `b` = B/2. Flips are done by threes: one look at memory for three spins. */
export function applySpinOperator(
  operator: SpinOperator,
  a: number,
  b: number,
  x: Float64Array,
  y: Float64Array,
): void {
  const { spins, size, mirror, classical } = operator
  for (let k = 0; k < size; k++) y[k] = b * classical[k]! * x[k]!
  const bits = mirror === 0 ? spins : spins - 1
  let i = 0
  for (; i + 3 <= bits; i += 3) flipThree(x, y, a, 1 << i)
  for (; i < bits; i++) flipOne(x, y, a, 1 << i)
  if (mirror !== 0) for (let k = 0; k < size; k++) y[k]! -= a * mirror * x[size - 1 - k]!
}
