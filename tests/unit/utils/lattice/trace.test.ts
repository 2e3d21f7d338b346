import { describe, expect, it } from 'vitest'
import { EDGE_KINDS } from '../../../../utils/lattice/scene-types'
import type { SceneEdge } from '../../../../utils/lattice/scene-types'
import { edgeFrom } from '../../../../utils/lattice/strokes'
import { fillEdge, placeEdge, stretchesBetween } from '../../../../utils/lattice/trace'
import { seeded } from './small-lattice'

const view = { scale: 10, x: 5, y: 7 }
const edge = (more: Partial<SceneEdge> = {}): SceneEdge => ({
  ...edgeFrom({ x1: 2, y1: 3, x2: 2, y2: 13, chain: 0 }, 'band', { size: 1, color: '#123456', z: 0 }),
  ...more,
})

/** Notes what would be filled. */
function recorder() {
  const rects: number[][] = []
  const paths: string[] = []
  const note = (name: string) => () => void paths.push(name)
  return {
    rects,
    paths,
    fillRect: (...rect: number[]) => void rects.push(rect),
    beginPath: note('begin'),
    moveTo: note('move'),
    lineTo: note('line'),
    arc: note('arc'),
    closePath: note('close'),
    fill: note('fill'),
  }
}

describe('stretches between gaps', () => {
  it('leave out exactly what lies within reach of a gap', () => {
    const random = seeded(4)
    for (let round = 0; round < 60; round++) {
      const gaps = Array.from({ length: Math.floor(random() * 6) }, () => random() * 24 - 2).sort((a, b) => a - b)
      const reach = 0.2 + random()
      const stretches = stretchesBetween(0, 20, gaps, reach)
      const wrong: number[] = []
      for (let t = 0.013; t < 20; t += 0.05) {
        const isLeft = gaps.every((gap) => Math.abs(t - gap) > reach)
        if (stretches.some(([from, to]) => t > from && t < to) !== isLeft) wrong.push(t)
      }
      expect(wrong).toEqual([])
    }
  })
})

describe('filling an edge', () => {
  it('takes one rectangle where ends need not be round', () => {
    const pen = recorder()
    fillEdge(pen, placeEdge(edge({ caps: 0 }), view, 6), 2)
    expect(pen.rects).toEqual([[23, 37, 4, 100]])
    expect(pen.paths).toEqual([])
  })

  it('rounds the ends of broad bands, and cuts them straight at gaps', () => {
    const pen = recorder()
    fillEdge(pen, placeEdge(edge({ gaps: [8] }), view, 6), 2)
    expect(pen.paths.filter((name) => name === 'fill')).toHaveLength(2)
    expect(pen.paths.filter((name) => name === 'arc')).toHaveLength(2)
  })

  it('leaves out a gap as broad as the band itself', () => {
    const pen = recorder()
    const placed = placeEdge(edge({ caps: 0, gaps: [8] }), view, 6)
    fillEdge(pen, placed, 1)
    expect(pen.rects).toEqual([
      [24, 37, 2, 50 - placed.radius],
      [24, 87 + placed.radius, 2, 50 - placed.radius],
    ])
  })

  it('fills part of a tube only, and nothing of no width', () => {
    const pen = recorder()
    fillEdge(pen, placeEdge(edge({ kind: EDGE_KINDS.tube }), view, 6), 2, [0, 25])
    fillEdge(pen, placeEdge(edge(), view, 6), 0)
    expect(pen.rects).toEqual([[23, 37, 4, 25]])
  })
})
