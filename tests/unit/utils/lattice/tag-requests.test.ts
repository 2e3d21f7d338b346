import { describe, expect, it } from 'vitest'
import { assignHues } from '../../../../utils/hues'
import { chainGeometry } from '../../../../utils/lattice/geometry'
import { carryTags, placeTags } from '../../../../utils/lattice/labels'
import type { StageLook } from '../../../../utils/lattice/stage-types'
import { tagInputOf } from '../../../../utils/lattice/tag-input'
import { requestTags, tagBands } from '../../../../utils/lattice/tag-requests'
import { readTokens } from '../../../../utils/lattice/tokens'
import { HAND_DRAWN, layerOf } from './small-lattice'

const chains = layerOf([[0, 1], [2, 3], [4]], [[0, 2]])
const geometry = chainGeometry(HAND_DRAWN, chains)
const source = {
  data: HAND_DRAWN,
  chains,
  geometry,
  hues: assignHues(3, { pairs: new Uint32Array(0), weights: new Float32Array(0) }),
  bounds: { x1: -2, y1: -2, x2: 8, y2: 4 },
}
const PLAIN: StageLook = {
  tokens: readTokens(() => ''),
  lens: 'occupancy',
  focused: null,
  hovered: null,
  overlay: null,
}
/** Every letter is 6 pixels wide. */
const ctx = { font: '', measureText: (text: string) => ({ width: 6 * text.length }) } as CanvasRenderingContext2D
const viewport = { x1: 0, y1: 0, x2: 400, y2: 300 }

function asked(look: Partial<StageLook>, view: { scale: number; x: number; y: number } | null = null) {
  const input = tagInputOf(source, { ...PLAIN, ...look }, tagBands(geometry))
  const { requests, looks } = requestTags(ctx, input, new Map(), view && { view, viewport })
  return {
    requests,
    texts: looks.map(({ text }) => text),
    kinds: looks.map(({ kind }) => kind),
    inks: looks.map(({ frame }) => frame),
  }
}

describe('which tags are asked for', () => {
  it('all chains alike, but only the hovered one of those that step back', () => {
    expect(asked({}).texts).toEqual(['v0', 'v1', 'v2'])
    expect(asked({ focused: 2 }).texts).toEqual(['v0', 'v2'])
    expect(asked({ focused: 2 }).kinds).toEqual(['chain', 'focus'])
    expect(asked({ focused: 2, hovered: 1 }).texts).toEqual(['v0', 'v1', 'v2'])
  })

  it('none but that of the focus and the hovered one where the legend hides labels', () => {
    const hiddenKinds = new Set(['labels'] as const)
    expect(asked({ hiddenKinds }).texts).toEqual([])
    expect(asked({ hiddenKinds, focused: 1, hovered: 0 }).texts).toEqual(['v0', 'v1'])
  })

  it('none of chains out of view or smaller than their tags', () => {
    expect(asked({}, { scale: 20, x: 50, y: 50 }).texts).toEqual(['v0', 'v1', 'v2'])
    // The bands of chain 0 reach over 3.8 lines, those of the others over less than one; tags are 20 pixels wide.
    expect(asked({}, { scale: 5, x: 50, y: 50 }).texts).toEqual(['v0'])
    expect(asked({ hovered: 2 }, { scale: 5, x: 50, y: 50 }).texts).toEqual(['v0', 'v2'])
    expect(asked({}, { scale: 20, x: -500, y: 50 }).texts).toEqual([])
  })

  it('writes rates of breaks and numbers of marked qubits, the more frequent break first', () => {
    const breaks = {
      chainRate: Float64Array.of(0.3, 0.05, 0),
      couplerRate: new Map([
        [0, 0.3],
        [3, 0.05],
      ]),
      reads: 9,
    }
    const { requests, texts, kinds } = asked({ lens: 'breaks', breaks })
    expect(texts.slice(3)).toEqual(['30%', '5.0%'])
    expect(kinds.slice(3)).toEqual(['note', 'note'])
    expect(requests[3]!.priority).toBeGreaterThan(requests[4]!.priority)
    expect(asked({ lens: 'breaks', breaks, hiddenKinds: new Set(['breaks'] as const) }).texts).toHaveLength(3)
    const marks = { qubits: Uint32Array.of(3), words: 'lost' }
    expect(asked({ marks }).texts.at(-1)).toBe('13')
    expect(asked({ marks }).requests.at(-1)!.spots[0]).toMatchObject({ x: 1, y: 0.5 })
  })

  it('keeps numbers of marked qubits off their marks, and in the colour of what they mark', () => {
    const regained = { qubits: Uint32Array.of(2), couplers: new Uint32Array(0), words: 'working again' }
    const { requests, inks } = asked({ marks: { qubits: Uint32Array.of(3), words: 'lost', regained } })
    expect(inks.slice(-2)).toEqual([PLAIN.tokens.claytext, PLAIN.tokens.leaf])
    for (const { width, height, spots } of requests.slice(-2))
      for (const { ox, oy } of spots) {
        const beside = ((Math.abs(ox) - 1) * width) / 2
        const below = ((Math.abs(oy) - 1) * height) / 2
        expect(Math.max(beside, below)).toBeGreaterThanOrEqual(9)
      }
  })
})

describe('tags carried to another view', () => {
  it('keep their spots, and give way to those of higher priority where they would touch', () => {
    const { requests } = asked({})
    const view = { scale: 40, x: 60, y: 60 }
    const placed = placeTags(requests, view, viewport, null)
    expect(placed).toHaveLength(3)
    const moved = carryTags(placed, { scale: 40, x: 75, y: 50 })
    expect(moved.map(({ box }) => box.x1)).toEqual(placed.map(({ box }) => box.x1 + 15))
    const crowded = carryTags(placed, { scale: 1, x: 60, y: 60 })
    expect(crowded.length).toBeLessThan(3)
    expect(crowded[0]!.key).toBe(placed[0]!.key)
  })
})
