import { describe, expect, it } from 'vitest'
import { annealReads } from '../../shared/engine/sampling/anneal'
import { packRows } from '../../shared/engine/sampling/merge'
import { samplerModel } from '../../shared/engine/sampling/physical-model'
import { spinOf } from '../../shared/engine/sampling/samples'
import { effectiveTemperature } from '../../shared/engine/readout/temperature'
import { createRandom } from '../../shared/engine/random'

/** A chain of n spins with the same coupling J on every bond, E = J Σ s_i s_{i+1} + h Σ s_i; closed to a ring on request. */
function chain(n: number, J: number, h: number, ring: boolean): ReturnType<typeof samplerModel> {
  const bonds = ring ? n : n - 1
  const ends = Uint32Array.from({ length: 2 * bonds }, (_, k) => ((k >> 1) + (k & 1)) % n)
  return samplerModel({ h: new Float64Array(n).fill(h), ends, J: new Float64Array(bonds).fill(J) })
}

describe('open Ising chain without field', () => {
  // Ising, Z. Phys. 31:253 (1925); any textbook on statistical mechanics: ⟨E⟩ per bond = −|J| tanh(|J|/T) for J < 0 and for
  // J > 0 alike. Bonds of the open chain are independent, so the sample mean over `reads` reads of n − 1 bonds has standard
  // error |J|·√((1 − tanh²) / (reads·(n − 1))).
  it.each([
    { J: -1, temperature: 0.8, sweeps: 1200 },
    { J: 1, temperature: 1.2, sweeps: 400 },
    { J: -1, temperature: 2, sweeps: 100 },
    { J: -2, temperature: 4, sweeps: 100 },
    { J: 1, temperature: 5, sweeps: 200 },
  ])('has energy −|J| tanh(|J|/T) per bond (J = $J, T = $temperature)', ({ J, temperature, sweeps }) => {
    const n = 64
    const reads = 400
    const samples = annealReads(
      chain(n, J, 0, false),
      { sweeps, seed: 17, startTemperature: temperature, temperature },
      0,
      reads,
    )
    let sum = 0
    for (let r = 0; r < reads; r++)
      for (let i = 0; i + 1 < n; i++) sum += J * spinOf(samples, r, i) * spinOf(samples, r, i + 1)
    const t = Math.tanh(Math.abs(J) / temperature)
    const error = Math.abs(J) * Math.sqrt((1 - t * t) / (reads * (n - 1)))
    expect(Math.abs(sum / (reads * (n - 1)) + Math.abs(J) * t)).toBeLessThan(4 * error)
  })

  // ⟨s_i s_{i+d}⟩ = tanh(|J|/T)^d for J < 0 (same sources).
  it('has correlations that fall as tanh(|J|/T)^d', () => {
    const n = 40
    const reads = 3000
    const samples = annealReads(
      chain(n, -1, 0, false),
      { sweeps: 150, seed: 3, startTemperature: 1.5, temperature: 1.5 },
      0,
      reads,
    )
    for (const d of [1, 2, 4]) {
      let sum = 0
      for (let r = 0; r < reads; r++) sum += spinOf(samples, r, 18) * spinOf(samples, r, 18 + d)
      const exact = Math.tanh(1 / 1.5) ** d
      expect(Math.abs(sum / reads - exact)).toBeLessThan(4 * Math.sqrt((1 - exact * exact) / reads))
    }
  })
})

describe('Ising ring in a field', () => {
  // Transfer matrix (Kramers & Wannier, Phys. Rev. 60:252, 1941): with K = −J/T, B = −h/T, eigenvalues
  // e^K cosh B ± √(e^{2K} sinh² B + e^{−2K}); per spin in a long ring ⟨s⟩ = sinh B / √(sinh² B + e^{−4K}).
  it.each([
    { J: -1, h: -0.3, temperature: 2 },
    { J: 0.7, h: -1, temperature: 1 },
  ])('has magnetisation sinh B / √(sinh² B + e^{−4K}) (J = $J, h = $h)', ({ J, h, temperature }) => {
    const n = 100
    const reads = 600
    const samples = annealReads(
      chain(n, J, h, true),
      { sweeps: 150, seed: 8, startTemperature: temperature, temperature },
      0,
      reads,
    )
    const means = Array.from({ length: reads }, (_, r) => {
      let sum = 0
      for (let i = 0; i < n; i++) sum += spinOf(samples, r, i)
      return sum / n
    })
    const mean = means.reduce((a, b) => a + b) / reads
    const error = Math.sqrt(means.reduce((sum, m) => sum + (m - mean) ** 2, 0) / (reads - 1) / reads)
    const field = Math.sinh(-h / temperature)
    const exact = field / Math.sqrt(field * field + Math.exp((4 * J) / temperature))
    expect(Math.abs(mean - exact)).toBeLessThan(4 * error)
  })
})

describe('effective temperature of exact chain samples', () => {
  // Open chain: bonds are independent and satisfied with probability 1 / (1 + e^{−2|J|/T}) (Ising 1925), so exact samples are
  // drawn bond by bond; the estimate (Besag 1975) must give 1/T back.
  it.each([0.7, 1.5, 4])('is the temperature they were drawn at (T = %d)', (temperature) => {
    const random = createRandom(5)
    const n = 50
    const reads = 800
    const spins: number[] = []
    for (let r = 0; r < reads; r++) {
      let spin = random.float() < 0.5 ? 1 : -1
      for (let i = 0; i < n; i++) {
        spins.push(spin)
        if (random.float() >= 1 / (1 + Math.exp(-2 / temperature))) spin = -spin
      }
    }
    const estimate = effectiveTemperature(chain(n, -1, 0, false), packRows(n, spins))!
    expect(Math.abs(estimate.inverseTemperature - 1 / temperature)).toBeLessThan(4 * estimate.standardError!)
    expect(estimate.standardError!).toBeLessThan(0.03)
  })
})
