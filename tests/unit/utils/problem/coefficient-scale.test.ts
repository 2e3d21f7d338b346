import { describe, expect, it } from 'vitest'
import { darkColours, lightColours } from '../../../../assets/css/tokens'
import {
  colourOfStep,
  countSteps,
  POLES,
  scaleOf,
  stepOf,
  widthOfStep,
} from '../../../../utils/problem/coefficient-scale'
import { channelsOf } from '../../../../utils/lattice/tokens'

describe('scaleOf', () => {
  it('has equal steps where sizes are alike, and growing ones where they differ by orders', () => {
    expect(scaleOf([-8, 4, 2, 6]).bounds).toEqual([2, 4, 6, 8])
    expect(scaleOf([-64, 1, 1, 0.5, 2]).bounds).toEqual([1, 4, 16, 64])
    expect(scaleOf([3, -3, 0]).bounds).toEqual([3])
    expect(scaleOf([0, 0]).bounds).toEqual([])
  })

  it('has nought in the middle and the same to both sides', () => {
    const scale = scaleOf([-8, 4, 2, 6])
    for (const value of [0.1, 2, 2.1, 5, 8]) expect(stepOf(scale, -value)).toBe(-stepOf(scale, value))
    expect([0, 2, 2.1, -8, -7].map((value) => stepOf(scale, value))).toEqual([0, 1, 2, -4, -4])
    expect(stepOf(scaleOf([]), 3)).toBe(0)
  })

  it('counts what falls into each step', () => {
    const values = [-8, 4, 2, 2, 0]
    expect(countSteps(scaleOf(values), values)).toEqual([
      { step: -4, count: 1 },
      { step: 0, count: 1 },
      { step: 1, count: 2 },
      { step: 2, count: 1 },
    ])
  })
})

describe('colours', () => {
  const linear = (colour: string) =>
    channelsOf(colour).map((v) => (v / 255 <= 0.04045 ? v / 255 / 12.92 : ((v / 255 + 0.055) / 1.055) ** 2.4))
  const luminance = (colour: string) => {
    const [r, g, b] = linear(colour)
    return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!
  }
  const contrast = (a: string, b: string) => {
    const [high, low] = [luminance(a), luminance(b)].sort((x, y) => y - x)
    return (high! + 0.05) / (low! + 0.05)
  }
  /** OKLab (Ottosson, 2020). */
  const oklab = ([r, g, b]: number[]) => {
    const l = Math.cbrt(0.4122214708 * r! + 0.5363325363 * g! + 0.0514459929 * b!)
    const m = Math.cbrt(0.2119034982 * r! + 0.6806995451 * g! + 0.1073969566 * b!)
    const s = Math.cbrt(0.0883024619 * r! + 0.2817188376 * g! + 0.6299787005 * b!)
    return [
      0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
      1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
      0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
    ]
  }
  /** Machado, Oliveira & Fernandes, IEEE TVCG 15:1291 (2009), full severity. */
  const SIGHTS = {
    normal: [1, 0, 0, 0, 1, 0, 0, 0, 1],
    protan: [0.152286, 1.052583, -0.204868, 0.114503, 0.786281, 0.099216, -0.003882, -0.048116, 1.051998],
    deutan: [0.367322, 0.860646, -0.227968, 0.280085, 0.672501, 0.047413, -0.01182, 0.04294, 0.968881],
    tritan: [1.255528, -0.076749, -0.178779, -0.078411, 0.930809, 0.147602, 0.004733, 0.691367, 0.3039],
  }
  const seen = (colour: string, sight: number[]) => {
    const from = linear(colour)
    const to = [0, 3, 6].map((row) => from.reduce((sum, v, k) => sum + sight[row + k]! * v, 0))
    return oklab(to.map((v) => Math.min(1, Math.max(0, v))))
  }
  const apart = (a: string, b: string, sight: number[]) => {
    const [p, q] = [seen(a, sight), seen(b, sight)]
    return Math.hypot(...p.map((v, k) => v - q[k]!))
  }

  it.each([
    ['light', lightColours, false],
    ['dark', darkColours, true],
  ] as const)('are told apart with any colour vision and on the paper, %s', (theme, colours, isDark) => {
    const tokens = { edge: colours.edge.toLowerCase(), isDark }
    const { negative, positive } = POLES[theme]
    for (const sight of Object.values(SIGHTS)) {
      expect(apart(negative, positive, sight)).toBeGreaterThan(0.14)
      for (const pole of [negative, positive]) expect(apart(pole, tokens.edge, sight)).toBeGreaterThan(0.1)
    }
    const scale = scaleOf([1, 2, 3, 4])
    for (let step = -4; step <= 4; step++)
      expect(contrast(colourOfStep(scale, step, tokens), colours.paper)).toBeGreaterThan(3)
    expect(colourOfStep(scale, 0, tokens)).toBe(tokens.edge)
    expect([colourOfStep(scale, -4, tokens), colourOfStep(scale, 4, tokens)]).toEqual([negative, positive])
  })

  it('tells size by width as well', () => {
    const scale = scaleOf([1, 2, 3, 4])
    const widths = [0, 1, 2, 3, 4].map((step) => widthOfStep(scale, step))
    expect(widths).toEqual([...widths].sort((a, b) => a - b))
    expect(widthOfStep(scale, -4)).toBe(widthOfStep(scale, 4))
  })
})
