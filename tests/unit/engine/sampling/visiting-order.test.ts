import { describe, expect, it } from 'vitest'
import { samplerModel } from '../../../../shared/engine/sampling/physical-model'
import { levelledOrder, shuffledOrder } from '../../../../shared/engine/sampling/visiting-order'
import { randomModel } from './models'

describe('levelledOrder', () => {
  it.each([
    { n: 1, density: 0 },
    { n: 30, density: 0.1 },
    { n: 25, density: 1 },
    { n: 200, density: 0.03 },
  ])('visits every spin once, neighbours in their shuffled order ($n spins, density $density)', ({ n, density }) => {
    const list = randomModel(n, n + 1, density)
    const model = samplerModel(list)
    const { order, starts } = levelledOrder(model, 9)
    expect([...order].sort((a, b) => a - b)).toEqual(Array.from({ length: n }, (_, i) => i))
    const shuffled = shuffledOrder(n, 9)
    for (let c = 0; c < list.J.length; c++) {
      const [a, b] = [list.ends[2 * c]!, list.ends[2 * c + 1]!]
      expect(order.indexOf(a) < order.indexOf(b)).toBe(shuffled.indexOf(a) < shuffled.indexOf(b))
    }
    expect([starts[0], starts.at(-1)]).toEqual([0, n])
    for (let l = 0; l + 1 < starts.length; l++) {
      const level = new Set(order.subarray(starts[l]!, starts[l + 1]!))
      expect(level.size).toBeGreaterThan(0)
      for (let c = 0; c < list.J.length; c++)
        expect(level.has(list.ends[2 * c]!) && level.has(list.ends[2 * c + 1]!)).toBe(false)
    }
  })

  it('is the same for the same seed and another one for another', () => {
    const model = samplerModel(randomModel(40, 1, 0.1))
    expect(levelledOrder(model, 5)).toEqual(levelledOrder(model, 5))
    expect(levelledOrder(model, 6).order).not.toEqual(levelledOrder(model, 5).order)
  })
})
