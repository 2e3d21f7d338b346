import { describe, expect, it } from 'vitest'
import { assignHues, HUES, INLAYS } from '../../../utils/hues'
import { seeded } from './lattice/small-lattice'

const conflicts = (list: [number, number, number][]) => ({
  pairs: Uint32Array.from(list.flatMap(([a, b]) => [a, b])),
  weights: Float32Array.from(list, ([, , weight]) => weight),
})

describe('assignHues', () => {
  it('gives every chain of a clique its own hue while there are enough', () => {
    const list: [number, number, number][] = []
    for (let i = 0; i < HUES.length; i++) for (let j = 0; j < i; j++) list.push([i, j, 4])
    const { hue, inlay } = assignHues(HUES.length, conflicts(list))
    expect(new Set(hue).size).toBe(HUES.length)
    expect([...inlay].every((k) => k === 0)).toBe(true)
  })

  it('spreads chains without conflicts evenly, and rotates the inlays within each hue', () => {
    const { hue, inlay } = assignHues(24, conflicts([]))
    for (let h = 0; h < HUES.length; h++) {
      const own = [...hue.keys()].filter((i) => hue[i] === h)
      expect(own).toHaveLength(3)
      expect(new Set(own.map((i) => inlay[i])).size).toBe(INLAYS.length)
    }
  })

  it('takes the lighter of two conflicts when one cannot be avoided', () => {
    // A hub beside eight mutually clashing chains: all hues are taken, the weakest bond gives way.
    const list: [number, number, number][] = []
    for (let i = 0; i < 8; i++) for (let j = 0; j < i; j++) list.push([i, j, 4])
    for (let i = 0; i < 8; i++) list.push([8, i, i === 5 ? 1 : 4])
    for (let leaf = 9; leaf < 20; leaf++) for (let i = 0; i < 8; i++) list.push([leaf, i, 0.001])
    const { hue } = assignHues(20, conflicts(list))
    expect(hue[8]).toBe(hue[5])
  })

  it('never leaves a chain a hue that a free one would beat, at the moment of choice', () => {
    const random = seeded(3)
    const list: [number, number, number][] = []
    for (let k = 0; k < 60; k++) {
      const a = Math.floor(random() * 30)
      const b = Math.floor(random() * 30)
      if (a !== b) list.push([a, b, [1, 2, 4][Math.floor(random() * 3)]!])
    }
    const degree = (i: number) => list.filter(([a, b]) => a === i || b === i).length
    const { hue } = assignHues(30, conflicts(list))
    const order = Array.from({ length: 30 }, (_, i) => i).sort((a, b) => degree(b) - degree(a) || a - b)
    order.forEach((chain, at) => {
      const before = new Set(order.slice(0, at))
      const cost = (h: number) =>
        list.reduce((sum, [a, b, weight]) => {
          const other = a === chain ? b : b === chain ? a : -1
          return sum + (before.has(other) && hue[other] === h ? weight : 0)
        }, 0)
      expect(cost(hue[chain]!)).toBe(Math.min(...HUES.map((_, h) => cost(h))))
    })
  })

  it('refuses weights that do not match and chains that do not exist', () => {
    expect(() => assignHues(2, { pairs: Uint32Array.of(0, 1), weights: new Float32Array(2) })).toThrow(RangeError)
    expect(() => assignHues(2, conflicts([[0, 2, 1]]))).toThrow('pair 0')
  })
})
