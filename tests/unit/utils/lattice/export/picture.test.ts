// @vitest-environment happy-dom
import { afterEach, describe, expect, it, vi } from 'vitest'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import { pictureFileName, svgOf } from '../../../../../utils/lattice/export/files'
import { layoutOf, PICTURE_DEFAULTS } from '../../../../../utils/lattice/export/layout'
import type { DrawnLattice } from '../../../../../utils/lattice/export/layout'
import { padBox } from '../../../../../utils/lattice/framing'
import { chainGeometry } from '../../../../../utils/lattice/geometry'
import { huesOfChains } from '../../../../../utils/lattice/hue-conflicts'
import { boxOfSegments } from '../../../../../utils/lattice/segments'
import type { StageLook } from '../../../../../utils/lattice/stage-types'
import { readTokens } from '../../../../../utils/lattice/tokens'
import type { ChainLayer, LatticeData } from '../../../../../utils/lattice/types'
import { HAND_DRAWN, latticeOf, layerOf } from '../small-lattice'

const LOOK: StageLook = {
  tokens: readTokens((name) => (name === '--paper' ? '#000000' : '')),
  lens: 'occupancy',
  focused: null,
  breaks: null,
  load: null,
  read: null,
  marks: null,
  hovered: null,
  overlay: null,
}

function drawn(data: LatticeData, chains: ChainLayer, look: Partial<StageLook> = {}): DrawnLattice {
  const bounds = padBox(boxOfSegments(data.segments)!, 1.5)
  const source = { data, chains, hues: huesOfChains(data, chains), geometry: chainGeometry(data, chains), bounds }
  return { source, look: { ...LOOK, ...look }, seen: bounds, scale: 20 }
}

/** Two chains that cross the hand-drawn machine: 10–13 and 12–14. */
const TWO = layerOf(
  [
    [0, 3],
    [2, 4],
  ],
  [[0, 1]],
)
const WORDS = { title: 'Deck & <radio>', lines: ['Occupancy.', 'two chains'] }

const parse = (svg: string) => new DOMParser().parseFromString(svg, 'image/svg+xml')
const open = (lattice: DrawnLattice, extent: 'whole machine' | 'current view' = 'whole machine') =>
  parse(svgOf(lattice, extent, WORDS))
const group = (svg: Document, id: string) => svg.querySelector(`g[id="${id}"]`)!
const texts = (of: ParentNode) => [...of.querySelectorAll('text')].map(({ textContent }) => textContent)
const fills = (of: ParentNode) => new Set([...of.querySelectorAll('path')].map((path) => path.getAttribute('fill')))
const look = (path: Element) => [path.getAttribute('fill'), path.getAttribute('stroke')]
/** Number of separate pieces of a path. */
const pieces = (path: Element) => path.getAttribute('d')!.match(/M/g)!.length

afterEach(() => vi.unstubAllGlobals())

/** Names of elements that were opened and not closed, or closed in another order. */
function unbalanced(xml: string): string[] {
  const open: string[] = []
  for (const [, end, name, own] of xml.matchAll(/<(\/?)([\w]+)(?:\s+[\w:-]+="[^"<&]*(?:&\w+;[^"<&]*)*")*\s*(\/?)>/g)) {
    if (own) continue
    if (!end) open.push(name!)
    else if (open.pop() !== name) return [name!]
  }
  return open
}

describe('an SVG picture', () => {
  it('is well-formed, whatever the names in it', () => {
    const odd = { ...TWO, labels: ['a<b & "c"', '\u0001d>'] }
    const svg = svgOf(drawn(HAND_DRAWN, odd), 'whole machine', WORDS)
    expect(unbalanced(svg)).toEqual([])
    // What is left without its elements holds no sign of markup.
    const text = svg.replace(/<\?xml[^>]*\?>|<\/?\w+(?:\s+[\w:-]+="[^"<]*")*\s*\/?>/g, '')
    expect(text).not.toMatch(/[<>]|&(?!amp;|lt;|gt;|quot;)/)
    expect(text).not.toContain('\u0001')
    expect(text).toContain('a&lt;b &amp; &quot;c&quot;')
  })

  it('is one document with title, description, ruler, legend and scale', () => {
    const svg = open(drawn(HAND_DRAWN, TWO))
    expect(svg.querySelector('parsererror')).toBe(null)
    expect(svg.documentElement.getAttribute('xmlns')).toBe('http://www.w3.org/2000/svg')
    expect(svg.querySelector('title')!.textContent).toBe('Deck & <radio>')
    expect(texts(group(svg, 'title'))).toEqual(['Deck & <radio>', 'Occupancy.', 'two chains'])
    expect(texts(group(svg, 'legend'))).toEqual(['chain, its label on the band', 'free qubit'])
    expect(texts(group(svg, 'scale'))).toEqual(['12 lines'])
    expect(texts(group(svg, 'ruler'))).toContain('0')
  })

  it('draws every chain in its hue with its label, on the paper of the light theme', () => {
    const lattice = drawn(HAND_DRAWN, TWO)
    const svg = open(lattice)
    const { hues } = lattice.source
    const light = readTokens(() => '')
    for (const chain of [0, 1]) expect(fills(group(svg, 'chains'))).toContain(light.hues[hues.hue[chain]!])
    expect(texts(group(svg, 'labels')).sort()).toEqual(['v0', 'v1'])
    expect(svg.querySelector('path')!.getAttribute('fill')).toBe(light.paper)
  })

  it('keeps each label within its tag where the fonts are missing', () => {
    const long = { ...TWO, labels: ['a longer label', 'b'] }
    const labels = [...group(open(drawn(HAND_DRAWN, long)), 'labels').querySelectorAll('text')]
    expect(labels.length).toBeGreaterThan(0)
    for (const label of labels) {
      expect(label.getAttribute('font-family')).toMatch(/^'IBM Plex Mono', ui-monospace, .*, monospace$/)
      const size = Number(label.getAttribute('font-size'))
      // Every sign of the mono face is 0.6 of its size wide.
      expect(Number(label.getAttribute('textLength'))).toBeCloseTo(0.6 * size * label.textContent!.length, 1)
      expect(label.getAttribute('lengthAdjust')).toBe('spacingAndGlyphs')
    }
    expect(open(drawn(HAND_DRAWN, long)).querySelector('g[id="legend"] text')!.getAttribute('textLength')).toBe(null)
  })

  it('draws the free qubits of the machine, and marks the missing ones', () => {
    const usable = Uint8Array.of(1, 0, 1, 1, 1)
    const svg = open(drawn({ ...HAND_DRAWN, usable }, layerOf([[0, 3]], [])))
    const machine = group(svg, 'machine')
    const light = readTokens(() => '')
    const free = [...machine.querySelectorAll('path')].filter((p) => look(p).includes(light.hair))
    expect(free.map(pieces)).toEqual([2])
    const missing = [...machine.querySelectorAll('path')].find((p) => p.getAttribute('stroke') === light.ink2)!
    expect(pieces(missing)).toBe(1)
    expect(texts(group(svg, 'legend'))).toContain('missing qubit')
  })

  it('puts bands where the layout says that their lines are', () => {
    const lattice = drawn(HAND_DRAWN, layerOf([[0, 1]], []))
    const { frame, view } = layoutOf(lattice, 'whole machine', 1)
    const svg = open(lattice)
    const band = [...group(svg, 'chains').querySelectorAll('path')].at(-1)!
    expect(band.getAttribute('transform')).toBe(`translate(${frame.x1} ${frame.y1})`)
    const ys = [...band.getAttribute('d')!.matchAll(/[ML][\d.-]+ ([\d.-]+)/g)].map(([, y]) => Number(y))
    expect((Math.min(...ys) + Math.max(...ys)) / 2).toBeCloseTo(view.y, 1)
  })

  it('shows the lens that is on, with its own legend', () => {
    const load = { qubitLoad: Float32Array.of(0.3, 0, 0.95, 0.5, 0.2) }
    const tubes = open(drawn(HAND_DRAWN, TWO, { lens: 'load', load }))
    expect(texts(group(tubes, 'legend'))).toContain('over 90 %')
    const breaks = { chainRate: Float64Array.of(0.14, 0), couplerRate: new Map([[1, 0.14]]), reads: 100 }
    const broken = open(drawn(HAND_DRAWN, TWO, { lens: 'breaks', breaks }))
    expect(texts(group(broken, 'labels'))).toContain('14%')
    expect(group(broken, 'chains').querySelectorAll('path[stroke-dasharray]').length).toBeGreaterThan(0)
    expect(texts(group(broken, 'legend')).join()).toContain('2 % and over')
  })

  it('hatches full tubes with a pattern of lines', () => {
    const pen = { strokeStyle: '', lineWidth: 0, moveTo: vi.fn(), lineTo: vi.fn(), stroke: vi.fn() }
    vi.stubGlobal(
      'OffscreenCanvas',
      class {
        getContext = () => pen
      },
    )
    const load = { qubitLoad: Float32Array.of(0.3, 0, 0.95, 0.5, 0.2) }
    const svg = open(drawn(HAND_DRAWN, TWO, { lens: 'load', load }))
    const pattern = svg.querySelector('pattern')!
    expect(pattern.querySelector('path')!.getAttribute('stroke')).toBe(readTokens(() => '').ochre)
    expect(fills(group(svg, 'chains'))).toContain(`url(#${pattern.getAttribute('id')})`)
  })

  it('leaves out what the legend hides and outlines what is pointed out', () => {
    const svg = open(
      drawn(HAND_DRAWN, TWO, {
        hiddenKinds: new Set(['free', 'labels']),
        overlay: { qubits: [1], couplers: [[0, 1]] },
      }),
    )
    expect(texts(group(svg, 'labels'))).toEqual([])
    expect(texts(group(svg, 'legend'))).toEqual(['chain, its label on the band', 'pointed out'])
    expect(group(svg, 'pointed-out').querySelectorAll('path').length).toBeGreaterThan(2)
  })

  it('takes the size and the place of the current view', () => {
    const lattice = { ...drawn(HAND_DRAWN, TWO), seen: { x1: 1, y1: -1, x2: 6, y2: 2 }, scale: 40 }
    const { frame, view } = layoutOf(lattice, 'current view', 1)
    expect([frame.x2 - frame.x1, frame.y2 - frame.y1]).toEqual([200, 120])
    expect(view).toEqual({ scale: 40, x: -40, y: 40 })
    const svg = open(lattice, 'current view')
    expect(Number(svg.documentElement.getAttribute('width'))).toBe(PICTURE_DEFAULTS.leastWidth)
    expect(svg.querySelector('clipPath')).not.toBe(null)
  })
})

describe('pictures of every family', () => {
  const families: PublishedFamily[] = [
    { kind: 'chimera', m: 3, n: 3, t: 4 },
    { kind: 'pegasus', m: 3 },
    { kind: 'zephyr', m: 3, t: 4 },
    { kind: 'king', width: 6, height: 5 },
    { kind: 'square', width: 6, height: 5 },
    { kind: 'cubic', width: 3, height: 3, depth: 2 },
    { kind: 'heavy-hex', rows: 2, columns: 2 },
  ] as PublishedFamily[]
  it.each(families.map((family) => [family.kind, family] as const))('%s', (_, family) => {
    const data = latticeOf(family)
    const [a, b] = [data.ends[0]!, data.ends[1]!]
    const svg = open(drawn(data, layerOf([[a, b]], [])))
    expect(svg.querySelector('parsererror')).toBe(null)
    expect(svg.documentElement.outerHTML).not.toMatch(/NaN|undefined|Infinity/)
    expect(texts(group(svg, 'labels'))).toEqual(['v0'])
  })

  it('keeps the whole of a large machine within bounds', () => {
    const data = latticeOf({ kind: 'zephyr', m: 15, t: 4 })
    const chains = layerOf(
      Array.from({ length: 200 }, (_, i) => [data.ends[600 * i]!, data.ends[600 * i + 1]!]),
      [],
    )
    const svg = svgOf(drawn(data, chains), 'whole machine', WORDS)
    expect(svg.length).toBeLessThan(4_000_000)
    const { width, height } = layoutOf(drawn(data, chains), 'whole machine', 1)
    expect(Math.max(width, height)).toBeLessThan(PICTURE_DEFAULTS.longestSide + 250)
  })
})

describe('pictureFileName', () => {
  it('says what the picture shows and is safe on every system', () => {
    expect(pictureFileName(['E-4', 'Décks: radio/channels', 'on Alder', 'load'], 'svg')).toBe(
      'E-4-Decks-radio-channels-on-Alder-load.svg',
    )
  })
})
