import { describe, expect, it } from 'vitest'
import { assignHues } from '../../../../utils/hues'
import type { Canvas2D } from '../../../../utils/lattice/paint-edges'
import { createPicture } from '../../../../utils/lattice/picture'
import type { PictureLook, PictureRequest } from '../../../../utils/lattice/picture'
import { readTokens } from '../../../../utils/lattice/tokens'
import { HAND_DRAWN, latticeOf, layerOf } from './small-lattice'

const tokens = readTokens(() => '')
const chains = layerOf([[0, 1], [2, 3], [4]], [[0, 2]])
const hues = assignHues(3, { pairs: new Uint32Array(0), weights: new Float32Array(0) })
const PLAIN: PictureLook = { tokens, lens: 'occupancy', focused: null }

/** A canvas that counts how often each colour is put down; a path of nothing puts nothing down. */
function countingCanvas() {
  const fills = new Map<string, number>()
  const put = (style: string) => fills.set(style, (fills.get(style) ?? 0) + 1)
  let isTraced = false
  const pen = { fillStyle: '', strokeStyle: '', lineWidth: 1, lineCap: 'butt', globalAlpha: 1 }
  const idle = Object.fromEntries(
    ['setTransform', 'lineTo', 'closePath', 'setLineDash'].map((name) => [name, () => {}]),
  )
  const ctx = Object.assign(pen, idle, {
    beginPath: () => (isTraced = false),
    moveTo: () => (isTraced = true),
    arc: () => (isTraced = true),
    fill: () => isTraced && put(pen.fillStyle),
    stroke: () => isTraced && put(pen.strokeStyle),
    fillRect: () => put(pen.fillStyle),
    strokeRect: () => put(pen.strokeStyle),
  })
  return { ctx: ctx as unknown as Canvas2D, fills }
}

function paint(
  look: Partial<PictureLook>,
  { data = HAND_DRAWN, kind = 'rest' as PictureRequest['kind'], scale = 20, x = 30, y = 40 } = {},
) {
  const picture = createPicture()
  picture.of({ data, chains: data === HAND_DRAWN ? chains : layerOf([], []), hues })
  picture.show({ ...PLAIN, ...look })
  const { ctx, fills } = countingCanvas()
  const steps = [...picture.paint(ctx, { view: { scale, x, y }, width: 300, height: 200, ratio: 1, kind })].length
  return { fills, steps, of: (colour: string) => fills.get(colour) ?? 0 }
}

const hueOf = (chain: number) => tokens.hues[hues.hue[chain]!]!

describe('the picture of the lattice', () => {
  it('is painted in steps, every chain in its hue', () => {
    const { steps, of } = paint({})
    expect(steps).toBeGreaterThan(4)
    for (const chain of [0, 1, 2]) expect(of(hueOf(chain))).toBeGreaterThan(0)
  })

  it('leaves the chain in focus to the layer above, unless the whole is asked for', () => {
    // Its thin line beneath the bands stays in the picture, one for each of its qubits.
    expect(paint({ focused: 2 }).of(hueOf(2))).toBe(1)
    expect(paint({ focused: 2 }, { kind: 'whole' }).of(hueOf(2))).toBeGreaterThan(1)
  })

  it('takes the hue from chains that step back, whether by focus, selection or legend', () => {
    for (const look of [{ focused: 2 }, { selected: new Set([0, 2]) }, { muted: new Set([1]) }])
      expect(paint(look).of(hueOf(1))).toBe(0)
  })

  it('puts nothing down where the camera looks elsewhere', () => {
    const { fills } = paint({}, { x: 5000 })
    expect([...fills.keys()]).toEqual([tokens.paper])
  })

  it('hides what the legend switched off', () => {
    const data = { ...HAND_DRAWN, usable: Uint8Array.of(1, 1, 1, 1, 1, 0), ids: Uint32Array.of(10, 11, 12, 13, 14, 15) }
    const segments = Float32Array.of(...HAND_DRAWN.segments, 0, 2, 6, 2)
    const shown = (hiddenKinds: PictureLook['hiddenKinds']) => paint({ hiddenKinds }, { data: { ...data, segments } })
    expect(shown(new Set()).of(tokens.ink2)).toBe(1)
    expect(shown(new Set(['missing'])).of(tokens.ink2)).toBe(0)
    expect(shown(new Set()).of(tokens.edge)).toBe(5)
    expect(shown(new Set(['free'])).of(tokens.edge)).toBe(0)
  })

  it('shows more of a lattice of points the nearer it is: a field, dots, couplers', () => {
    const data = latticeOf({ kind: 'king', width: 6, height: 4 })
    const at = (scale: number) => paint({}, { data, scale })
    expect(at(2).of(tokens.hair)).toBe(4)
    expect(at(2).of(tokens.edge)).toBe(0)
    expect([at(5).of(tokens.hair), at(5).of(tokens.edge), at(5).of(tokens.rule)]).toEqual([0, 24, 0])
    expect([at(9).of(tokens.edge), at(9).of(tokens.rule)]).toEqual([24, 1])
  })

  it('points out what was lost and what works again, each by a shape of its own, at any distance', () => {
    const marks = {
      qubits: Uint32Array.of(1),
      words: 'lost',
      couplers: Uint32Array.of(0, 3, 2, 4),
      regained: { qubits: Uint32Array.of(0), couplers: Uint32Array.of(1, 4), words: 'regained' },
    }
    for (const scale of [20, 1.2]) {
      const { of } = paint({ marks }, { scale })
      expect([of(tokens.clay), of(tokens.leaf)]).toEqual([3, 2])
    }
    const hidden = paint({ marks, hiddenKinds: new Set(['marks', 'regained'] as const) })
    expect([hidden.of(tokens.clay), hidden.of(tokens.leaf)]).toEqual([0, 0])
  })
})
