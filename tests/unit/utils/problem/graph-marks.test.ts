import { describe, expect, it } from 'vitest'
import { marksOf, paintMarks } from '../../../../utils/problem/graph-marks'
import type { MarksInput } from '../../../../utils/problem/graph-marks'
import { readTokens } from '../../../../utils/lattice/tokens'

const TOKENS = readTokens(() => '')

const input = (more: Partial<MarksInput> = {}): MarksInput => ({
  positions: Float32Array.of(-1, 0, 0, 0, 1, 0, 0, 1),
  steps: Int8Array.of(-2, 0, 2, 1),
  scale: { bounds: [1, 2] },
  tokens: TOKENS,
  focused: null,
  hovered: null,
  selected: new Set(),
  near: new Set(),
  isHidden: () => false,
  ...more,
})

/** Discs in the order painted: place, radius and colour. */
function painted(marks: MarksInput, growth = 1) {
  const discs: { x: number; y: number; radius: number; colour: string }[] = []
  const ctx = {
    fillStyle: '',
    beginPath() {},
    arc(x: number, y: number, radius: number) {
      discs.push({ x, y, radius, colour: ctx.fillStyle })
    },
    fill() {},
  }
  for (const _ of paintMarks(ctx as unknown as CanvasRenderingContext2D, marks, { scale: 100, x: 10, y: 20 }, growth));
  return discs
}

describe('marksOf', () => {
  it('leaves out hidden ones, and of raised ones all but focus, selection, pointer and partners', () => {
    const at = (marks: ReturnType<typeof marksOf>) => [...new Set(marks.map(({ x, y }) => `${x} ${y}`))]
    expect(at(marksOf(input({ isHidden: (i) => i === 1 })))).toEqual(['-1 0', '1 0', '0 1'])
    expect(marksOf(input(), 'raised')).toEqual([])
    const some = input({ focused: 0, near: new Set([1]), hovered: 3 })
    expect(at(marksOf(some, 'raised'))).toEqual(['-1 0', '0 0', '0 1'])
  })
})

describe('paintMarks', () => {
  it('paints each variable where the view puts it: paper, rim and fill, hollow where positive', () => {
    const discs = painted(input())
    expect(discs.map(({ x, y }) => `${x} ${y}`)).toEqual(
      ['-90 20', '10 20', '110 20', '10 120'].flatMap((at) => [at, at, at]),
    )
    const paper = TOKENS.paper
    expect([0, 3, 6].map((k) => discs[k]!.colour)).toEqual([paper, paper, paper])
    expect(discs[2]!.colour).toBe(discs[1]!.colour)
    expect(discs[8]!.colour).toBe(paper)
    expect(discs[7]!.colour).not.toBe(paper)
  })

  it('paints the same marks as are drawn live, larger by the growth', () => {
    const live = marksOf(input()).map(({ size }) => size)
    painted(input(), 1.5)
      .filter((_, k) => k % 3 === 0)
      .forEach(({ radius }, i) => expect(radius).toBeCloseTo(1.5 * live[i]!))
  })

  it('leaves out hidden ones', () => expect(painted(input({ isHidden: (i) => i > 0 }))).toHaveLength(3))
})
