import { describe, expect, it } from 'vitest'
import { partnersOf, partnersOfVariable } from '../../../../utils/problem/graph'
import { placeLabels } from '../../../../utils/problem/graph-labels'
import type { LabelRequest } from '../../../../utils/problem/graph-labels'
import { DIRECTIONS, nearestVariable, partnerTowards } from '../../../../utils/problem/graph-steps'

const graph = {
  labels: ['a', 'b', 'c', 'd', 'e'],
  rows: Uint32Array.of(0, 0, 1, 2),
  cols: Uint32Array.of(1, 2, 2, 3),
}

describe('partnersOf', () => {
  it('lists the interactions of each variable', () => {
    const partners = partnersOf(graph)
    const read = (i: number) => partnersOfVariable(partners, i).map((p) => [p.variable, p.interaction])
    expect(graph.labels.map((_, i) => read(i))).toEqual([
      [
        [1, 0],
        [2, 1],
      ],
      [
        [0, 0],
        [2, 2],
      ],
      [
        [0, 1],
        [1, 2],
        [3, 3],
      ],
      [[2, 3]],
      [],
    ])
    expect(read(9)).toEqual([])
  })
})

describe('partnerTowards', () => {
  const positions = [0, 0, 10, 1, 4, 3, -5, 0, 0, -8]
  const all = [1, 2, 3, 4].map((variable) => ({ variable, interaction: 0 }))
  const go = (key: string) => partnerTowards(positions, 0, all, DIRECTIONS[key]!)

  it('leads to the partner that lies that way, near and straight before far and aslant', () => {
    expect(go('ArrowLeft')).toBe(3)
    expect(go('ArrowUp')).toBe(4)
    expect(go('ArrowRight')).toBe(2)
    expect(partnerTowards([0, 0, 6, 0, 4, 3.5], 0, all.slice(0, 2), DIRECTIONS.ArrowRight!)).toBe(1)
  })

  it('leads nowhere where no partner lies that way', () => {
    expect(partnerTowards(positions, 0, all.slice(2), DIRECTIONS.ArrowDown!)).toBeNull()
    expect(partnerTowards(positions, 0, [], DIRECTIONS.ArrowUp!)).toBeNull()
  })
})

describe('nearestVariable', () => {
  it('finds the nearest within reach', () => {
    expect(nearestVariable([0, 0, 5, 0], 3, 0, 4)).toBe(1)
    expect(nearestVariable([0, 0, 5, 0], 2.6, 3, 2)).toBe(-1)
  })
})

describe('placeLabels', () => {
  const ask = (x: number, y: number, insists = false): LabelRequest => ({
    text: '',
    x,
    y,
    radius: 4,
    width: 30,
    height: 12,
    insists,
  })

  it('never lets labels cover each other, and takes another side before it gives up', () => {
    const placed = placeLabels([ask(50, 50), ask(60, 50), ask(50, 52)], 200, 100)
    expect(placed.map(({ x, y }) => [x, y])).toEqual([
      [56, 44],
      [24, 44],
      [35, 58],
    ])
  })

  it('keeps off marks', () => {
    const mark = { x: 70, y: 50, radius: 4 }
    expect(placeLabels([ask(50, 50)], 200, 100, [mark])[0]).toMatchObject({ x: 14, y: 44 })
    expect(placeLabels([ask(50, 50)], 200, 100, [{ ...mark, y: 61 }])[0]).toMatchObject({ x: 56, y: 44 })
  })

  it('leaves out what finds no place, unless it insists', () => {
    const crowd = Array.from({ length: 9 }, () => ask(50, 50))
    expect(placeLabels(crowd, 200, 100)).toHaveLength(4)
    expect(placeLabels([...crowd, ask(50, 50, true)], 200, 100)).toHaveLength(5)
    expect(placeLabels([ask(-40, 50)], 200, 100)).toHaveLength(0)
  })
})
