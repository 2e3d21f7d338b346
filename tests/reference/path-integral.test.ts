import { describe, expect, it } from 'vitest'
import { createRandom } from '../../shared/engine/random'
import { programmedTemperature } from '../../shared/engine/sampling/anneal-path'
import { createWorld, pathIntegralReads, pathWeights, sweepWorld } from '../../shared/engine/sampling/path-integral'
import type { CouplingList } from '../../shared/engine/sampling/physical-model'
import { samplerModel } from '../../shared/engine/sampling/physical-model'
import { chiSquared, mostChiSquared } from '../support/two-sample'

const quiet = { cancelled: () => false, report: () => undefined }
type Matrix = number[][]

const multiply = (a: Matrix, b: Matrix): Matrix =>
  a.map((row) => b[0]!.map((_, j) => row.reduce((sum, x, k) => sum + x * b[k]![j]!, 0)))
const scaled = (a: Matrix, by: number): Matrix => a.map((row) => row.map((x) => x * by))
const identity = (n: number): Matrix =>
  Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_unused, j) => (i === j ? 1 : 0)))

/** e^M by its series after halving M until it is small, squared back. */
function exponential(m: Matrix): Matrix {
  const halvings = 12
  const small = scaled(m, 2 ** -halvings)
  let [term, sum] = [identity(m.length), identity(m.length)]
  for (let k = 1; k < 20; k++) {
    term = scaled(multiply(term, small), 1 / k)
    sum = sum.map((row, i) => row.map((x, j) => x + term[i]![j]!))
  }
  for (let k = 0; k < halvings; k++) sum = multiply(sum, sum)
  return sum
}

const energyOf = ({ h, ends, J }: CouplingList, state: number): number => {
  const spin = (i: number) => ((state >> i) & 1 ? 1 : -1)
  return (
    h.reduce((sum, field, i) => sum + field * spin(i), 0) +
    J.reduce((sum, j, c) => sum + j * spin(ends[2 * c]!) * spin(ends[2 * c + 1]!), 0)
  )
}

/** H = −A/2 Σ σx + B/2 E(σz) over 2^n states, split into its two parts. */
function hamiltonian(list: CouplingList, A: number, B: number): { across: Matrix; along: Matrix } {
  const states = 2 ** list.h.length
  const across = Array.from({ length: states }, (_, i) =>
    Array.from({ length: states }, (_unused, j) => (((i ^ j) & ((i ^ j) - 1)) === 0 && i !== j ? -A / 2 : 0)),
  )
  const along = identity(states).map((row, i) => row.map((x) => (x * B * energyOf(list, i)) / 2))
  return { across, along }
}

const diagonalOf = (m: Matrix): number[] => {
  const total = m.reduce((sum, row, i) => sum + row[i]!, 0)
  return m.map((row, i) => row[i]! / total)
}

/** Probability of each state along z in thermal equilibrium. */
function exactPopulations(list: CouplingList, A: number, B: number, temperature: number): number[] {
  const { across, along } = hamiltonian(list, A, B)
  return diagonalOf(exponential(across.map((row, i) => row.map((x, j) => -(x + along[i]![j]!) / temperature))))
}

/** The same with P Trotter slices: (e^(−H_z/2PT) e^(−H_x/PT) e^(−H_z/2PT))^P (Trotter 1959; Suzuki 1976). */
function trotterPopulations(list: CouplingList, A: number, B: number, temperature: number, slices: number): number[] {
  const { across, along } = hamiltonian(list, A, B)
  const half = exponential(scaled(along, -1 / (2 * slices * temperature)))
  const step = multiply(half, multiply(exponential(scaled(across, -1 / (slices * temperature))), half))
  let power = identity(step.length)
  for (let k = 0; k < slices; k++) power = multiply(power, step)
  return diagonalOf(power)
}

const SYSTEMS: readonly { name: string; list: CouplingList }[] = [
  { name: 'one spin', list: { h: Float64Array.of(0.7), ends: new Uint32Array(0), J: new Float64Array(0) } },
  { name: 'two spins', list: { h: Float64Array.of(0.3, -0.2), ends: Uint32Array.of(0, 1), J: Float64Array.of(-0.8) } },
  {
    name: 'three spins',
    list: {
      h: Float64Array.of(0.2, -0.4, 0.1),
      ends: Uint32Array.of(0, 1, 1, 2, 0, 2),
      J: Float64Array.of(-1, 0.5, 0.7),
    },
  },
]
const [A, B, temperature] = [1.4, 2.2, 0.6]
/** Constant A and B: a pause of the whole anneal, so that reads come to equilibrium. */
const table = { s: [0, 1], A: [A, A], B: [B, B] }

describe('one spin in a field across', () => {
  // Energies ±½√(A² + B²h²): ⟨σz⟩ = −(Bh/2)/E·tanh(E/T), ⟨σx⟩ = (A/2)/E·tanh(E/T); any textbook on a spin one half.
  const h = 0.7
  const E = Math.hypot(A, B * h) / 2
  const z = (-(B * h) / 2 / E) * Math.tanh(E / temperature)
  const x = (A / 2 / E) * Math.tanh(E / temperature)

  it('has the closed form’s populations by exponential, so the exponential is right', () => {
    const [down, up] = exactPopulations(SYSTEMS[0]!.list, A, B, temperature)
    expect(up! - down!).toBeCloseTo(z, 10)
  })

  it('has ⟨σz⟩ from slices and ⟨σx⟩ from pairs of neighbouring slices', () => {
    const slices = 48
    const model = samplerModel(SYSTEMS[0]!.list)
    const random = createRandom(4)
    const world = createWorld(model, slices, random)
    const weights = pathWeights(A, B, slices, temperature)
    // A pair of like slices has weight cosh ε, one of unlike slices sinh ε, with ε = A/2PT: σx exchanges the two.
    const tanh = Math.tanh(A / (2 * slices * temperature))
    const blocks = 40
    const [zs, xs] = [new Float64Array(blocks), new Float64Array(blocks)]
    const sweeps = 3000
    for (let k = 0; k < blocks * sweeps; k++) {
      sweepWorld(world, model, weights, random)
      let [sum, across] = [0, 0]
      for (let p = 0; p < slices; p++) {
        sum += world.spins[p]!
        across += world.spins[p] === world.spins[(p + 1) % slices] ? tanh : 1 / tanh
      }
      const block = Math.floor(k / sweeps)
      zs[block]! += sum / slices / sweeps
      xs[block]! += across / slices / sweeps
    }
    const check = (values: Float64Array, exact: number, most: number): void => {
      const mean = values.reduce((a, b) => a + b) / blocks
      const error = Math.sqrt(values.reduce((sum, v) => sum + (v - mean) ** 2, 0) / (blocks - 1) / blocks)
      expect(error).toBeLessThan(most)
      expect(Math.abs(mean - exact)).toBeLessThan(4 * error + 2e-4)
    }
    check(zs, z, 0.008)
    check(xs, x, 0.03)
  })
})

describe.each(SYSTEMS)('$name against exact diagonalisation', ({ list }) => {
  const exact = exactPopulations(list, A, B, temperature)
  it.each([2, 4, 16])('reads have the populations of %d slices', (slices) => {
    const reads = 6000
    const options = { table, schedule: { t: [0, 1], s: [0.5, 0.5] }, slices, sweeps: 60, seed: 5, temperature }
    const samples = pathIntegralReads(samplerModel(list), { ...options, reads, firstRead: 0 }, quiet)
    const seen = exact.map(() => 0)
    for (let r = 0; r < reads; r++) seen[samples.bytes[r]!]!++
    const expected = trotterPopulations(list, A, B, temperature, slices).map((p) => reads * p)
    const { value, freedom } = chiSquared(seen, expected)
    expect(value).toBeLessThan(mostChiSquared(Math.max(freedom, 1)))
  })

  it('the error of slices falls as 1/P²', () => {
    const errors = [4, 8, 16, 32].map((slices) => {
      const populations = trotterPopulations(list, A, B, temperature, slices)
      return Math.max(...populations.map((p, k) => Math.abs(p - exact[k]!)))
    })
    for (let k = 1; k < errors.length; k++) {
      expect(errors[k - 1]! / errors[k]!).toBeGreaterThan(3.5)
      expect(errors[k - 1]! / errors[k]!).toBeLessThan(4.5)
    }
  })
})

describe('the physical temperature', () => {
  it('is kT / (B(1)/2) in programmed units', () => {
    expect(programmedTemperature(15, { s: [0, 1], A: [6, 0], B: [0.1, 10] })).toBeCloseTo((0.015 * 20.83661912) / 5, 8)
    expect(programmedTemperature(15, { s: [0, 1], A: [6, 0], B: [0, 0] })).toBeNull()
  })
})
