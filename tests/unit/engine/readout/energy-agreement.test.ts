import { describe, expect, it } from 'vitest'
import type { Programmed } from '../../../../shared/engine/programming/programme'
import { createRandom } from '../../../../shared/engine/random'
import { energyAgreement } from '../../../../shared/engine/readout/energy-agreement'
import { packRows } from '../../../../shared/engine/sampling/merge'

/** A ring of six qubits in three chains, with fields. */
const programmed: Programmed = {
  qubits: Uint32Array.from([0, 1, 2, 3, 4, 5]),
  h: Float64Array.from([0.3, -0.2, 0, 0.7, -0.5, 0.1]),
  ends: Uint32Array.from([0, 1, 1, 2, 2, 3, 3, 4, 4, 5, 0, 5]),
  J: Float64Array.from([-1, 0.4, -1, 0.25, -1, -0.35]),
  isChainCoupler: Uint8Array.from([1, 0, 1, 0, 1, 0]),
  scale: 0.5,
  offset: 1.75,
  limitedBy: 'J',
  chainStrength: Float64Array.from([2, 2, 2]),
  chainOf: Uint32Array.from([0, 0, 1, 1, 2, 2]),
}
const WIDTH = 6
const ROWS = 60
const random = createRandom(11)
const spins = Array.from({ length: ROWS * WIDTH }, () => (random.float() < 0.5 ? 1 : -1))
const gauges = Uint32Array.from({ length: ROWS }, (_, r) => 1 + (r % 3))
const SIGNS = [
  [1, 1, -1, -1, 1, 1],
  [-1, -1, 1, 1, 1, 1],
  [-1, -1, -1, -1, 1, 1],
]
const signsOf = (gauge: number): Int8Array => Int8Array.from(SIGNS[gauge - 1]!)

/** Written out as the sums stand in the textbook. */
function energy(r: number, { fields = 1, couplings = 1, turned = false } = {}): number {
  const s = Array.from({ length: WIDTH }, (_, p) => spins[r * WIDTH + p]! * (turned ? SIGNS[r % 3]![p]! : 1))
  let [a, b] = [0, 0]
  for (let p = 0; p < WIDTH; p++) a += programmed.h[p]! * s[p]!
  for (let c = 0; c < 6; c++) b += programmed.J[c]! * s[programmed.ends[2 * c]!]! * s[programmed.ends[2 * c + 1]!]!
  return fields * a + couplings * b
}

const given = (of: (r: number) => number, isDone = true, withGauges = true) =>
  energyAgreement(
    { ...packRows(WIDTH, spins), energies: Float64Array.from({ length: ROWS }, (_, r) => of(r)), gauges },
    programmed,
    withGauges ? { signsOf, isDone } : null,
  )

describe('energies that came with samples', () => {
  it.each([
    ['programmed', (r: number) => energy(r)],
    ['programmed with offset', (r: number) => energy(r) + 1.75],
    ['problem', (r: number) => (energy(r) + 1.75) / 0.5],
    ['problem, maximised', (r: number) => -(energy(r) + 1.75) / 0.5],
    ['programmed', (r: number) => Math.fround(energy(r))],
  ])('are told by their meaning: %s', (meaning, of) => {
    expect(given(of)).toMatchObject({ meaning, cause: null, rows: ROWS, agreeing: ROWS })
  })

  it.each([
    ['spins or fields reversed', (r: number) => energy(r, { fields: -1 })],
    ['energy negated', (r: number) => -energy(r)],
    ['couplings reversed', (r: number) => energy(r, { couplings: -1 })],
    ['constant offset', (r: number) => energy(r) + 123.5],
    ['unknown', (r: number) => energy((r * 7 + 3) % ROWS)],
    ['gauge undone twice', (r: number) => energy(r, { turned: true })],
  ])('that disagree are explained: %s', (cause, of) => {
    const { meaning, cause: found, worst } = given(of)
    expect({ meaning, found }).toEqual({ meaning: null, found: cause })
    expect(worst).toBeGreaterThan(0.1)
  })

  it('says that a gauge was not undone where the rows stand as they were read', () => {
    expect(given((r) => energy(r, { turned: true }), false).cause).toBe('gauge not undone')
    expect(given((r) => energy(r, { turned: true }), true, false).cause).toBe('unknown')
  })

  it('lets one row in a hundred be wrong, and no more', () => {
    expect(given((r) => energy(r) + (r === 5 ? 1 : 0))).toMatchObject({ meaning: null })
    const many = Array.from({ length: 4 }, () => spins).flat()
    const rows = 4 * ROWS
    const energies = Float64Array.from({ length: rows }, (_, r) => energy(r % ROWS) + (r === 5 ? 1 : 0))
    const { meaning, agreeing, worst } = energyAgreement(
      { ...packRows(WIDTH, many), energies, gauges: null },
      programmed,
      null,
    )
    expect({ meaning, agreeing }).toEqual({ meaning: 'programmed', agreeing: rows - 1 })
    expect(worst).toBeCloseTo(1, 9)
  })
})
