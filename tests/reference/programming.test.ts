import { describe, expect, it } from 'vitest'
import { packChains } from '../../shared/engine/embedding/embedding'
import { graphFromEdges } from '../../shared/engine/graph/build'
import { programme } from '../../shared/engine/programming/programme'
import { chainStrengths, choiBounds, cutBounds } from '../../shared/engine/programming/strength'
import { energyNoise } from '../../shared/engine/programming/precision'
import { isingOf, must } from '../unit/engine/programming/instances'

const usual = { fieldSplit: 'even', interactionCouplers: 'all', chainCouplers: 'all' } as const
const ranges = { h: [-4, 4], J: [-1, 1], couplingSum: null } as const

/**
 * K_n on a grid of crossing wires: wire i is a path along row i and column i of an n × n grid of unit cells, joined at the
 * diagonal, one coupler where two wires cross (the triangular layout of Choi, Quantum Inf. Process. 10:343, 2011).
 * Qubit of wire i at crossing with wire j: i·n + j; its chain is the path j = 0 … n − 1.
 */
function crossingWires(n: number): {
  machine: ReturnType<typeof graphFromEdges>
  embedding: ReturnType<typeof packChains>
} {
  const ends: number[] = []
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) {
      if (j + 1 < n) ends.push(i * n + j, i * n + j + 1)
      if (j > i) ends.push(i * n + j, j * n + i)
    }
  const chains = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_unused, j) => i * n + j))
  return { machine: graphFromEdges(n * n, ends), embedding: packChains(chains) }
}

const completeIsing = (n: number, value: number): ReturnType<typeof isingOf> => {
  const pairs: [number, number, number][] = []
  for (let i = 0; i < n; i++) for (let j = i + 1; j < n; j++) pairs.push([i, j, value])
  return isingOf(new Array<number>(n).fill(0), pairs)
}

describe('antiferromagnetic complete graphs on crossing wires', () => {
  // Choi, arXiv:0804.4884 (2008): Σ_j |J_ij| − |h_i| = n − 1 is enough. The cut bound of a path whose qubits carry one unit
  // each (the one at its own crossing none) is the smaller half of n − 1: closed form ⌊(n − 1)/2⌋.
  it.each([3, 4, 7, 12, 20])('n = %i: Choi n − 1, cut ⌊(n − 1)/2⌋', (n) => {
    const input = { ...crossingWires(n), ising: completeIsing(n, 1), ...usual }
    expect([...choiBounds(input.ising)]).toEqual(new Array<number>(n).fill(n - 1))
    const { bound, exact } = cutBounds(input)
    expect([...bound]).toEqual(new Array<number>(n).fill(Math.floor((n - 1) / 2)))
    expect(exact.every((e) => e === 1)).toBe(true)
  })

  // Venturelli et al., PRX 5:031040 (2015): on fully connected spin glasses the best strength grows as √n. The rule with κ = 1
  // on ±1 couplings is √(n − 1) exactly.
  it.each([5, 17])('n = %i: the root-mean-square rule is √(n − 1)', (n) => {
    const { perChain } = chainStrengths(
      { rule: 'rms', value: 1 },
      { ...crossingWires(n), ising: completeIsing(n, -1), ...usual },
    )
    for (const k of perChain) expect(k).toBeCloseTo(Math.sqrt(n - 1), 12)
  })

  // Least energy of the antiferromagnetic K_n: −⌊n/2⌋, reached when the spins balance (max-cut of K_n is ⌊n²/4⌋, the edges cut
  // less those not cut). A balanced state must have it through scale and offset; chains of n qubits have n − 1 couplers.
  it.each([4, 9])('n = %i: the balanced state has energy −⌊n/2⌋ through scale and offset', (n) => {
    const k = 2.5
    const input = {
      ...crossingWires(n),
      ising: completeIsing(n, 1),
      strengths: new Float64Array(n).fill(k),
      ranges,
      ...usual,
    }
    const programmed = must(programme(input).programmed)
    expect(programmed.scale).toBeCloseTo(1 / k, 12)
    expect(programmed.offset).toBeCloseTo((n * (n - 1) * k) / k, 10)
    const spins = Array.from(programmed.chainOf, (i) => (i % 2 ? 1 : -1))
    let energy = 0
    programmed.J.forEach(
      (J, c) => (energy += J * spins[programmed.ends[2 * c]!]! * spins[programmed.ends[2 * c + 1]!]!),
    )
    expect((energy + programmed.offset) / programmed.scale).toBeCloseTo(-Math.floor(n / 2), 10)
  })

  // King & McGeoch, arXiv:1410.2628 (2014): control error as independent Gaussians on programmed values. U qubits and C
  // couplers give the energy a standard deviation √(U σ_h² + C σ_J²) in programmed units.
  it('has the energy noise of independent errors', () => {
    const n = 6
    const ising = completeIsing(n, 1)
    const input = { ...crossingWires(n), ising, strengths: new Float64Array(n).fill(2), ranges, ...usual }
    const noise = energyNoise(must(programme(input).programmed), { sigmaH: 0.03, sigmaJ: 0.02 })
    // 36 qubits, 30 chain couplers, 15 interaction couplers, scale 1/2.
    expect(noise.absolute).toBeCloseTo(2 * Math.sqrt(36 * 0.0009 + 45 * 0.0004), 12)
    expect(noise.ofOrder).toBeCloseTo(2 * Math.sqrt(36 * 0.0009 + 15 * 0.0004), 12)
  })
})
