import { describe, expect, it } from 'vitest'
import { createRandom } from '../../../../../shared/engine/random'
import { annealSchedule } from '../../../../../shared/engine/sampling/annealing-schedule'
import { assemblyLanes } from '../../../../../shared/engine/sampling/lanes/assembly'
import { laneModel, LANES } from '../../../../../shared/engine/sampling/lanes/lane-model'
import type { Lanes } from '../../../../../shared/engine/sampling/lanes/lane-model'
import { plainLanes } from '../../../../../shared/engine/sampling/lanes/plain'
import type { LaneKind } from '../../../../../shared/engine/sampling/lanes/rounding'
import { samplerModel } from '../../../../../shared/engine/sampling/physical-model'
import { randomModel } from '../models'

const KINDS: readonly LaneKind[] = ['16-bit', '32-bit']

function started(lanes: Lanes, n: number): Lanes {
  const random = createRandom(3)
  lanes.begin(
    Uint16Array.from({ length: n }, () => random.uint32() & 0xffff),
    12345,
    -6789,
  )
  return lanes
}

describe.each(KINDS)('a kernel and its plain twin, %s', (kind) => {
  it.each([
    { n: 1, density: 0 },
    { n: 2, density: 1 },
    { n: 7, density: 0.4 },
    { n: 60, density: 0.1 },
    { n: 40, density: 1 },
  ])('give the same spins sweep by sweep ($n spins, density $density)', ({ n, density }) => {
    const model = samplerModel(randomModel(n, n, density))
    const inSteps = laneModel(model, kind, 4)
    const schedule = annealSchedule(model, { sweeps: 60, seed: 1, startTemperature: 40, temperature: 0.01 })
    const kernel = started(assemblyLanes(inSteps)!, n)
    const plain = started(plainLanes(inSteps), n)
    expect(kernel.spins()).toEqual(plain.spins())
    const seen = new Set<string>()
    schedule.forEach((beta, k) => {
      kernel.sweep(beta, k)
      plain.sweep(beta, k)
      expect(kernel.spins()).toEqual(plain.spins())
      seen.add(plain.spins().join())
    })
    expect(seen.size).toBeGreaterThan(n === 1 ? 1 : 20)
  })

  it('goes down in energy at the lowest temperature, whatever the sizes', () => {
    for (const size of [1e-6, 1, 1e6]) {
      const list = randomModel(30, 5, 0.3)
      const model = samplerModel({ ...list, h: list.h.map((h) => h * size), J: list.J.map((J) => J * size) })
      const inSteps = laneModel(model, kind, 1)
      const lanes = started(assemblyLanes(inSteps)!, 30)
      for (let k = 0; k < 50; k++) lanes.sweep(1e4 / size, k)
      const words = lanes.spins()
      for (let lane = 0; lane < LANES; lane++)
        for (let k = 0; k < 30; k++) {
          const spin = (q: number) => ((words[q]! >> lane) & 1 ? 1 : -1)
          let field = model.h[inSteps.order[k]!]! * inSteps.scale
          for (let p = inSteps.offsets[k]!; p < inSteps.offsets[k + 1]!; p++)
            field += inSteps.weights[p]! * spin(inSteps.targets[p]!)
          expect(spin(k) * field).toBeLessThan(2)
        }
    }
  })
})
