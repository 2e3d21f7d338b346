import { describe, expect, it } from 'vitest'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import { createRandom } from '../../shared/engine/random'
import { annealIn } from '../../shared/engine/sampling/anneal-in'
import type { Arithmetic } from '../../shared/engine/sampling/arithmetic'
import { assemblyLanes } from '../../shared/engine/sampling/lanes/assembly'
import { laneModel, LANES } from '../../shared/engine/sampling/lanes/lane-model'
import type { CouplingList } from '../../shared/engine/sampling/physical-model'
import { samplerModel } from '../../shared/engine/sampling/physical-model'
import { energiesOfRows, squareLattice } from '../unit/engine/sampling/lattices'
import { chiSquared, kolmogorovSmirnov, mostChiSquared } from '../support/two-sample'

const quiet = { cancelled: () => false, report: () => undefined }
const ARITHMETICS: readonly Arithmetic[] = ['16-bit', '32-bit', '64-bit']
const LANE_KINDS = ['16-bit', '32-bit'] as const

interface Run {
  arithmetic: Arithmetic
  temperature: number
  sweeps: number
  reads: number
  seed?: number
}

/** Energies of reads at constant temperature from random starts. */
function thermalEnergies(list: CouplingList, { arithmetic, temperature, sweeps, reads, seed = 11 }: Run): Float64Array {
  const options = { arithmetic, reads, sweeps, seed, startTemperature: temperature, temperature }
  return energiesOfRows(list, annealIn(samplerModel(list), options, quiet))
}

const mean = (values: Float64Array): number => values.reduce((a, b) => a + b) / values.length
const variance = (values: Float64Array): number => {
  const middle = mean(values)
  return values.reduce((sum, v) => sum + (v - middle) ** 2, 0) / (values.length - 1)
}

describe.each(ARITHMETICS)('open chain without field, %s', (arithmetic) => {
  // Transfer matrix (Ising, Z. Phys. 31:253, 1925): bonds are independent, ⟨J s s'⟩ = −|J| tanh(|J|/T).
  it.each([
    { temperature: 0.8, sweeps: 1200 },
    { temperature: 2, sweeps: 200 },
    { temperature: 5, sweeps: 200 },
  ])('has energy −Σ|J| tanh(|J|/T) with variance Σ J²(1 − tanh²) (T = $temperature)', ({ temperature, sweeps }) => {
    const random = createRandom(1)
    const J = Float64Array.from({ length: 63 }, () => 0.4 + random.float())
    const list = { h: new Float64Array(64), ends: Uint32Array.from({ length: 126 }, (_, k) => (k >> 1) + (k & 1)), J }
    const reads = 1600
    const energies = thermalEnergies(list, { arithmetic, temperature, sweeps, reads })
    const exact = -J.reduce((sum, j) => sum + j * Math.tanh(j / temperature), 0)
    const spread = J.reduce((sum, j) => sum + j * j * (1 - Math.tanh(j / temperature) ** 2), 0)
    expect(Math.abs(mean(energies) - exact)).toBeLessThan(4 * Math.sqrt(spread / reads))
    expect(Math.abs(variance(energies) / spread - 1)).toBeLessThan(4 * Math.sqrt(2 / reads))
  })
})

describe.each(ARITHMETICS)('periodic square lattice of 4 × 4, %s', (arithmetic) => {
  // All 65,536 states enumerated: the whole distribution of the energy, not only its mean.
  const list = squareLattice(4, -1)
  const levels = new Map<number, number>()
  for (let state = 0; state < 2 ** 16; state++) {
    let energy = 0
    for (let c = 0; c < list.J.length; c++)
      energy -= ((state >> list.ends[2 * c]!) ^ (state >> list.ends[2 * c + 1]!)) & 1 ? -1 : 1
    levels.set(energy, (levels.get(energy) ?? 0) + 1)
  }
  it.each([1.8, 2.6, 4])('has every energy as often as its Boltzmann weight says (T = %d)', (temperature) => {
    const reads = 8000
    const energies = thermalEnergies(list, { arithmetic, temperature, sweeps: 300, reads })
    const weights = [...levels].map(([energy, states]) => states * Math.exp(-energy / temperature))
    const total = weights.reduce((a, b) => a + b)
    const seen = [...levels.keys()].map((energy) => energies.filter((e) => e === energy).length)
    const { value, freedom } = chiSquared(
      seen,
      weights.map((weight) => (reads * weight) / total),
    )
    expect(freedom).toBeGreaterThan(5)
    expect(value).toBeLessThan(mostChiSquared(freedom))
  })
})

/** Complete elliptic integral of the first kind, by the arithmetic-geometric mean (Gauss). */
function ellipticK(k: number): number {
  let [a, b] = [1, Math.sqrt(1 - k * k)]
  for (let i = 0; i < 40; i++) [a, b] = [(a + b) / 2, Math.sqrt(a * b)]
  return Math.PI / (2 * a)
}

/** Energy a spin of the infinite lattice with J = −1 (Onsager, Phys. Rev. 65:117, 1944). */
function onsagerEnergy(temperature: number): number {
  const K = 1 / temperature
  const kappa = (2 * Math.sinh(2 * K)) / Math.cosh(2 * K) ** 2
  return -(1 + (2 / Math.PI) * (2 * Math.tanh(2 * K) ** 2 - 1) * ellipticK(kappa)) / Math.tanh(2 * K)
}

it('Onsager’s energy at the critical temperature 2 / ln(1 + √2) is −√2', () => {
  // Kramers & Wannier 1941; Onsager 1944. The integral has its pole there, so only close to it.
  expect(onsagerEnergy(2 / Math.log(1 + Math.SQRT2) + 1e-6)).toBeCloseTo(-Math.SQRT2, 4)
})

describe.each(LANE_KINDS)('periodic square lattice of 64 × 64, %s', (kind) => {
  // On either side of the critical temperature 2.269, both far enough for a side of 64 to be as good as infinite. From all
  // spins up: below it a random start would be caught in stripes.
  it.each([2, 3])('has Onsager’s energy (T = %d)', (temperature) => {
    const side = 64
    const list = squareLattice(side, -1)
    const model = laneModel(samplerModel(list), kind, 2)
    const lanes = assemblyLanes(model)!
    lanes.begin(new Uint16Array(side * side).fill(0xffff), 7, 8)
    const sums = new Float64Array(LANES)
    const [burnIn, sweeps, every] = [400, 4000, 20]
    for (let k = 0; k < burnIn + sweeps; k++) {
      lanes.sweep(1 / temperature, k)
      if (k < burnIn || k % every > 0) continue
      const words = lanes.spins()
      for (let i = 0; i < model.n; i++)
        for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++) {
          const unlike = words[i]! ^ words[model.targets[p]!]!
          // Every bond is met from both ends.
          for (let lane = 0; lane < LANES; lane++) sums[lane]! += (unlike >> lane) & 1 ? 0.5 : -0.5
        }
    }
    const means = sums.map((sum) => sum / (sweeps / every) / model.n)
    const error = Math.sqrt(variance(means) / LANES)
    expect(error).toBeLessThan(0.001)
    expect(Math.abs(mean(means) - onsagerEnergy(temperature))).toBeLessThan(4 * error)
  })
})

describe.each(LANE_KINDS)(
  'real-valued fields and couplings on Pegasus P(4), %s against the plain loop',
  (arithmetic) => {
    const { graph } = buildFabric({ kind: 'pegasus', m: 4, trimmed: true })
    const random = createRandom(6)
    const list = {
      h: Float64Array.from({ length: graph.order }, () => 2 * random.float() - 1),
      ends: Uint32Array.from(graph.ends),
      J: Float64Array.from({ length: graph.ends.length / 2 }, () => 2 * random.float() - 1),
    }
    it.each([0.6, 1.5, 4])('has the same distribution of energies (T = %d)', (temperature) => {
      const run = { temperature, sweeps: 200, reads: 800 }
      const fast = thermalEnergies(list, { ...run, arithmetic })
      const plain = thermalEnergies(list, { ...run, arithmetic: '64-bit', seed: 12 })
      expect(kolmogorovSmirnov(fast, plain).p).toBeGreaterThan(0.001)
      expect(variance(fast) / variance(plain)).toBeGreaterThan(0.75)
    })

    it('gives reads that are independent of those beside them in a vector', () => {
      const energies = thermalEnergies(list, { arithmetic, temperature: 1.5, sweeps: 60, reads: 200 * LANES })
      const groups = Float64Array.from({ length: 200 }, (_, g) => mean(energies.subarray(g * LANES, (g + 1) * LANES)))
      // The variance of a mean of sixteen independent values is a sixteenth; the estimate's relative error is √(2/199).
      expect(Math.abs((LANES * variance(groups)) / variance(energies) - 1)).toBeLessThan(4 * Math.sqrt(2 / 199))
    })
  },
)

describe('the two-sample test', () => {
  it('tells a shift of a fifth of a deviation, and takes none for one', () => {
    const random = createRandom(2)
    const draw = (shift: number) => Float64Array.from({ length: 2000 }, () => random.normal() + shift)
    expect(kolmogorovSmirnov(draw(0), draw(0)).p).toBeGreaterThan(0.01)
    expect(kolmogorovSmirnov(draw(0), draw(0.2)).p).toBeLessThan(1e-4)
  })
})
