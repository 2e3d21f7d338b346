import { expect, it } from 'vitest'
import { createRandom } from '../../../../shared/engine/random'
import { Descent } from '../../../../shared/engine/readout/descend'
import { samplerModel } from '../../../../shared/engine/sampling/physical-model'

/** Energies by the double sum, over a full matrix. */
function energyOf(h: number[], J: number[][], s: number[]): number {
  return s.reduce((sum, a, i) => sum + h[i]! * a + s.slice(0, i).reduce((part, b, j) => part + J[i]![j]! * a * b, 0), 0)
}

/** Looks at the energy of every state one flip away, and goes to the lowest; the first of equals. */
function naive(h: number[], J: number[][], start: number[]): number[] {
  let state = start
  for (;;) {
    const energies = state.map((_, i) =>
      energyOf(
        h,
        J,
        state.map((a, k) => (k === i ? -a : a)),
      ),
    )
    const least = Math.min(...energies)
    if (least >= energyOf(h, J, state) - 1e-9) return state
    const chosen = energies.findIndex((energy) => energy < least + 1e-9)
    state = state.map((a, k) => (k === chosen ? -a : a))
  }
}

it('takes the same way as looking at every flip, ties and all', () => {
  const random = createRandom(3)
  for (let trial = 0; trial < 300; trial++) {
    const n = 1 + random.below(12)
    const whole = (): number => random.below(7) - 3
    const h = Array.from({ length: n }, whole)
    const J = Array.from({ length: n }, (_, i) => Array.from({ length: i }, () => (random.float() < 0.6 ? whole() : 0)))
    const pairs = J.flatMap((row, i) => row.flatMap((value, j) => (value === 0 ? [] : [{ i, j, value }])))
    const model = samplerModel({
      h: Float64Array.from(h),
      ends: Uint32Array.from(pairs.flatMap(({ i, j }) => [j, i])),
      J: Float64Array.from(pairs, ({ value }) => value),
    })
    const descent = new Descent(model, 1e-12)
    // One object serves many rows: nothing of an earlier one may be left.
    for (let row = 0; row < 3; row++) {
      const start = Array.from({ length: n }, () => (random.float() < 0.5 ? 1 : -1))
      const spins = Int8Array.from(start)
      descent.run(spins)
      expect([...spins]).toEqual(naive(h, J, start))
    }
  }
})

it('leaves a model without spins alone', () => {
  const model = samplerModel({ h: new Float64Array(0), ends: new Uint32Array(0), J: new Float64Array(0) })
  expect(() => new Descent(model, 0).run(new Int8Array(0))).not.toThrow()
})
