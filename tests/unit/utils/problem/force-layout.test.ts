import { describe, expect, it } from 'vitest'
import { createForceLayout, LAYOUT_DEFAULTS, pullsOf, stepsFor } from '../../../../utils/problem/force-layout'
import type { LayoutTask } from '../../../../utils/problem/force-layout'

/** Two complete graphs of `size` joined by one interaction. */
function twoCliques(size: number): LayoutTask {
  const pairs: [number, number][] = [[0, size]]
  for (const base of [0, size])
    for (let i = 0; i < size; i++) for (let j = 0; j < i; j++) pairs.push([base + j, base + i])
  return {
    variables: 2 * size,
    rows: Uint32Array.from(pairs, ([i]) => i),
    cols: Uint32Array.from(pairs, ([, j]) => j),
    pulls: new Float64Array(pairs.length).fill(1),
    seed: 5,
    start: null,
  }
}
function laidOut(task: LayoutTask, steps: number) {
  const layout = createForceLayout(task)
  for (let step = 0; step < steps; step++) layout.step()
  return layout.positions()
}
const distance = (positions: Float32Array, i: number, j: number) =>
  Math.hypot(positions[2 * i]! - positions[2 * j]!, positions[2 * i + 1]! - positions[2 * j + 1]!)

describe('createForceLayout', () => {
  it('gives the same picture for the same seed and another for another', () => {
    const task = twoCliques(6)
    expect(laidOut(task, 40)).toEqual(laidOut(task, 40))
    expect(laidOut({ ...task, seed: 6 }, 40)).not.toEqual(laidOut(task, 40))
  })

  it('lays those apart that do not interact, and those together that do', () => {
    for (const size of [8, LAYOUT_DEFAULTS.groupFrom / 16]) {
      const task = twoCliques(size)
      const positions = laidOut(task, 300)
      let within = 0
      let between = Infinity
      for (let i = 0; i < 2 * size; i++)
        for (let j = 0; j < i; j++) {
          const isPair = i < size === j < size
          if (isPair) within = Math.max(within, distance(positions, i, j))
          else if (i !== size || j !== 0) between = Math.min(between, distance(positions, i, j))
        }
      expect(between).toBeGreaterThan(0.5 * within)
    }
  })

  it('comes to rest, and goes on from where it was', () => {
    const task = twoCliques(6)
    const layout = createForceLayout(task)
    const first = layout.step()
    let last = first
    for (let step = 0; step < 500 && last >= LAYOUT_DEFAULTS.settled; step++) last = layout.step()
    expect(last).toBeLessThan(first / 20)
    const start = layout.positions()
    expect(createForceLayout({ ...task, start }).positions()).toEqual(start)
  })

  it('places variables without interactions, and a single one', () => {
    const none = {
      rows: new Uint32Array(0),
      cols: new Uint32Array(0),
      pulls: new Float64Array(0),
      seed: 1,
      start: null,
    }
    for (const variables of [0, 1, 3]) {
      const positions = laidOut({ ...none, variables }, 20)
      expect(positions).toHaveLength(2 * variables)
      expect([...positions].every(Number.isFinite)).toBe(true)
    }
  })
})

describe('pullsOf', () => {
  it('rises with the size of the coefficient, whatever its sign, and is never nought', () => {
    const pulls = pullsOf(Float64Array.of(-4, 1, 0.04, 4))
    expect(pulls[0]).toBe(1)
    expect(pulls[3]).toBe(1)
    expect(pulls[1]).toBeCloseTo(LAYOUT_DEFAULTS.leastPull + (1 - LAYOUT_DEFAULTS.leastPull) / 2)
    expect(pulls[2]).toBeGreaterThan(LAYOUT_DEFAULTS.leastPull)
    expect([...pullsOf(new Float64Array(2))]).toEqual([LAYOUT_DEFAULTS.leastPull, LAYOUT_DEFAULTS.leastPull])
  })
})

describe('stepsFor', () => {
  it('makes fewer steps for larger problems, within bounds', () => {
    expect([0, 10, 800, 2000].map(stepsFor)).toEqual([600, 600, 375, 250])
  })
})
