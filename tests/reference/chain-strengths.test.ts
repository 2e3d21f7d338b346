import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { LayoutInput } from '../../shared/engine/programming/layout'
import { programme } from '../../shared/engine/programming/programme'
import type { Programmed } from '../../shared/engine/programming/programme'
import { choiBounds, cutBounds } from '../../shared/engine/programming/strength'
import { must, randomInstance, wideRanges } from '../unit/engine/programming/instances'

/*
 * Bounds of chain strengths against enumeration of programmed problems, from their energies alone. Choi,
 * arXiv:0804.4884 (2008): above Σ|J| − |h| no ground state breaks the chain. The cut bound is Espalier's own.
 */

const settings = fc.record({
  seed: fc.integer({ min: 1, max: 100_000 }),
  field: fc.constantFrom(0, 0.6, 3, 8),
  density: fc.constantFrom(0.06, 0.2, 0.4),
  fieldSplit: fc.constantFrom('even' as const, 'external coupling' as const),
  interactionCouplers: fc.constantFrom('all' as const, 'one' as const),
  chainCouplers: fc.constantFrom('all' as const, 'spanning tree' as const),
})
type Settings = typeof settings extends fc.Arbitrary<infer T> ? T : never

function inputOf({ seed, field, density, ...splits }: Settings, order: number, sizes: readonly number[]): LayoutInput {
  return { ...randomInstance(seed, { order, sizes, density, field }), ...splits }
}

const programmedAt = (input: LayoutInput, strengths: Float64Array): Programmed =>
  must(programme({ ...input, strengths, ranges: wideRanges, scale: 1 }).programmed)

/** Energies of all states of some spins, bit q of an index being spin q up: each from the one without its lowest bit. */
function energiesOf(fields: ArrayLike<number>, pairs: readonly (readonly [number, number, number])[]): Float64Array {
  const n = fields.length
  const touching = Array.from({ length: n }, () => [] as (readonly [number, number])[])
  let down = 0
  for (let q = 0; q < n; q++) down -= fields[q]!
  for (const [a, b, J] of pairs) {
    down += J
    touching[a]!.push([b, J])
    touching[b]!.push([a, J])
  }
  const energies = new Float64Array(2 ** n)
  energies[0] = down
  for (let state = 1; state < energies.length; state++) {
    const q = 31 - Math.clz32(state & -state)
    const rest = state & (state - 1)
    let local = fields[q]!
    for (const [other, J] of touching[q]!) local += (rest >> other) & 1 ? J : -J
    energies[state] = energies[rest]! + 2 * local
  }
  return energies
}

const pairsOf = ({ ends, J }: Programmed): [number, number, number][] =>
  Array.from(J, (value, c) => [ends[2 * c]!, ends[2 * c + 1]!, value])

/** Whether all states of least energy keep every chain whole. */
function groundStatesUnbroken(programmed: Programmed): boolean {
  const energies = energiesOf(programmed.h, pairsOf(programmed))
  const least = energies.reduce((a, b) => Math.min(a, b))
  const masks = new Map<number, number>()
  programmed.chainOf.forEach((i, p) => masks.set(i, (masks.get(i) ?? 0) | (1 << p)))
  return energies.every(
    (energy, state) =>
      energy > least + 1e-9 || [...masks.values()].every((mask) => (state & mask) === 0 || (state & mask) === mask),
  )
}

interface LoneChain {
  fields: number[]
  inside: [number, number, number][]
  /** Couplings to other chains: spin of the chain, and J. */
  outside: [number, number][]
}

/** One chain with its couplings to others, whose signs are free. */
function chainOf({ h, ends, J, chainOf }: Programmed, variable: number): LoneChain {
  const spins = new Map([...chainOf.keys()].filter((p) => chainOf[p] === variable).map((p, spin) => [p, spin]))
  const lone: LoneChain = { fields: [...spins.keys()].map((p) => h[p]!), inside: [], outside: [] }
  J.forEach((value, c) => {
    const [a, b] = [spins.get(ends[2 * c]!), spins.get(ends[2 * c + 1]!)]
    if (a !== undefined && b !== undefined) lone.inside.push([a, b, value])
    else if (a !== undefined || b !== undefined) lone.outside.push([(a ?? b)!, value])
  })
  return lone
}

/** Whether some choice of the neighbours' signs has a broken state below both whole ones. */
function canBreak({ fields, inside, outside }: LoneChain): boolean {
  for (let signs = 0; signs < 2 ** outside.length; signs++) {
    const pulled = fields.slice()
    outside.forEach(([q, J], c) => (pulled[q]! += (signs >> c) & 1 ? J : -J))
    const energies = energiesOf(pulled, inside)
    const whole = Math.min(energies[0]!, energies.at(-1)!)
    if (energies.some((energy) => energy < whole - 1e-12)) return true
  }
  return false
}

describe('Choi’s theorem by enumeration', () => {
  // The theorem takes the field to be shared as the couplings are.
  it('has no broken ground state above Σ|J| − |h|', () => {
    fc.assert(
      fc.property(settings, (given) => {
        const input = inputOf({ ...given, fieldSplit: 'external coupling' }, 13, [4, 3, 3, 2])
        const bounds = choiBounds(input.ising)
        expect(
          groundStatesUnbroken(
            programmedAt(
              input,
              bounds.map((bound) => bound + 1e-6),
            ),
          ),
        ).toBe(true)
      }),
      { seed: 1, numRuns: 120 },
    )
  })
})

describe('the cut bound by enumeration', () => {
  it('has no broken ground state above it, for every split', () => {
    let broken = 0
    fc.assert(
      fc.property(settings, (given) => {
        const input = inputOf(given, 13, [4, 3, 3, 2])
        const { bound } = cutBounds(input)
        expect(
          groundStatesUnbroken(
            programmedAt(
              input,
              bound.map((b) => b + 1e-6),
            ),
          ),
        ).toBe(true)
        if (
          !groundStatesUnbroken(
            programmedAt(
              input,
              bound.map((b) => 0.3 * b),
            ),
          )
        )
          broken++
      }),
      { seed: 2, numRuns: 150 },
    )
    // The cases are not such that nothing could break.
    expect(broken).toBeGreaterThan(10)
  })

  it('is tight: 1 % below it some choice of the neighbours’ signs breaks the chain, 1 % above none does', () => {
    let compared = 0
    let cyclic = 0
    fc.assert(
      fc.property(settings, (given) => {
        const input = inputOf(given, 14, [5, 4, 3, 1])
        const { bound, exact } = cutBounds(input)
        const [below, above] = [0.99, 1.01].map((factor) =>
          programmedAt(
            input,
            bound.map((b) => factor * b),
          ),
        )
        for (let variable = 0; variable < 4; variable++) {
          const [weak, strong] = [chainOf(below!, variable), chainOf(above!, variable)]
          if (bound[variable] === 0 || weak.outside.length > 10) continue
          expect(exact[variable]).toBe(1)
          expect(canBreak(weak)).toBe(true)
          expect(canBreak(strong)).toBe(false)
          compared++
          if (weak.inside.length >= weak.fields.length) cyclic++
        }
      }),
      { seed: 3, numRuns: 120 },
    )
    expect(compared).toBeGreaterThan(100)
    expect(cyclic).toBeGreaterThan(20)
  })

  it('is safe where it is not exact: long chains with cycles or strong fields', () => {
    let inexact = 0
    fc.assert(
      fc.property(settings, (given) => {
        const input = inputOf({ ...given, chainCouplers: 'all' }, 24, [14, 1, 1, 1, 1, 1])
        const { bound, exact } = cutBounds(input)
        const { fields, inside, outside } = chainOf(programmedAt(input, new Float64Array(6).fill(1)), 0)
        const pull = new Float64Array(fields.length)
        for (const [q, J] of outside) pull[q]! += Math.abs(J)
        let worst = 0
        for (let up = 1; up < 2 ** fields.length - 1; up++) {
          const sides = [0, 0]
          fields.forEach((field, q) => (sides[(up >> q) & 1]! += (up >> q) & 1 ? pull[q]! - field : pull[q]! + field))
          const cut = inside.filter(([a, b]) => ((up >> a) ^ (up >> b)) & 1).length
          worst = Math.max(worst, Math.min(sides[0]!, sides[1]!) / cut)
        }
        if (exact[0]) expect(bound[0]).toBeCloseTo(worst, 10)
        else expect(bound[0]).toBeGreaterThanOrEqual(worst - 1e-12)
        if (!exact[0] && bound[0]! > worst + 1e-9) inexact++
      }),
      { seed: 4, numRuns: 40 },
    )
    expect(inexact).toBeGreaterThan(5)
  })
})
