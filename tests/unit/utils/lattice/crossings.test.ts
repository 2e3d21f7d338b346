import { describe, expect, it } from 'vitest'
import { crossingsOf, passesOver } from '../../../../utils/lattice/crossings'
import { seeded } from './small-lattice'

describe('crossingsOf', () => {
  it('finds what a check of every pair finds', () => {
    const random = seeded(11)
    const strips = Array.from({ length: 80 }, (_, chain) => {
      const line = Math.floor(random() * 30)
      const from = Math.floor(random() * 25)
      const to = from + 1 + Math.floor(random() * 12)
      const isLevel = random() < 0.5
      return {
        chain: chain % 17,
        ...(isLevel ? { x1: to, x2: from, y1: line, y2: line } : { x1: line, x2: line, y1: from, y2: to }),
      }
    })
    const expected: string[] = []
    strips.forEach((h, i) =>
      strips.forEach((v, j) => {
        if (h.y1 !== h.y2 || v.x1 !== v.x2 || h.chain === v.chain) return
        const [left, right] = [Math.min(h.x1, h.x2), Math.max(h.x1, h.x2)]
        if (left <= v.x1 && v.x1 <= right && v.y1 <= h.y1 && h.y1 <= v.y2) expected.push(`${i} ${j}`)
      }),
    )
    const found = crossingsOf(strips).map(({ horizontal, vertical }) => `${horizontal} ${vertical}`)
    expect(found.length).toBeGreaterThan(50)
    expect(found.sort()).toEqual(expected.sort())
  })

  it('alternates over and under along every line', () => {
    for (let k = -3; k < 3; k++) {
      expect(passesOver({ x: k, y: 2 })).not.toBe(passesOver({ x: k + 1, y: 2 }))
      expect(passesOver({ x: 5, y: k })).not.toBe(passesOver({ x: 5, y: k + 1 }))
    }
  })
})
