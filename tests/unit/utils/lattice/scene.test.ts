import { describe, expect, it } from 'vitest'
import { assignHues } from '../../../../utils/hues'
import { chainGeometry } from '../../../../utils/lattice/geometry'
import { buildScene } from '../../../../utils/lattice/scene'
import { EDGE_KINDS, HATCH } from '../../../../utils/lattice/scene-types'
import type { SceneInput } from '../../../../utils/lattice/scene-types'
import { tailsOf } from '../../../../utils/lattice/tails'
import { tiersOf } from '../../../../utils/lattice/tiers'
import { sceneGraph } from '../../../../utils/lattice/to-graph'
import { readTokens } from '../../../../utils/lattice/tokens'
import { HAND_DRAWN, latticeOf, layerOf } from './small-lattice'

const tokens = readTokens(() => '')
const chains = layerOf(
  [[0, 1], [2, 3], [4]],
  [
    [0, 1],
    [0, 2],
  ],
)
const input = (more: Partial<SceneInput> = {}): SceneInput => ({
  data: HAND_DRAWN,
  geometry: chainGeometry(HAND_DRAWN, chains),
  hues: assignHues(3, { pairs: new Uint32Array(0), weights: new Float32Array(0) }),
  tokens,
  lens: 'occupancy',
  focused: null,
  ...more,
})

describe('tiers', () => {
  it('sets the focus, what interacts with it, and the rest apart', () => {
    expect(tiersOf(input())).toEqual(['full', 'full', 'full'])
    expect(tiersOf(input({ focused: 1 }))).toEqual(['near', 'focus', 'far'])
    expect(tiersOf(input({ focused: 99 }))).toEqual(['full', 'full', 'full'])
  })
})

describe('occupancy', () => {
  it('draws one band for each straight piece of a chain and a square where a chain crosses itself', () => {
    const { edges, nodes } = buildScene(input())
    expect(edges.map(({ kind, chain }) => [kind, chain])).toEqual([
      [EDGE_KINDS.band, 0],
      [EDGE_KINDS.band, 1],
      [EDGE_KINDS.band, 1],
      [EDGE_KINDS.band, 2],
    ])
    expect(nodes.map(({ shape, x, y, chain }) => [shape, x, y, chain])).toEqual([['square', 1, 1, 1]])
  })

  it('lets an upright band pass under a level one at every other crossing', () => {
    const all = layerOf(
      [[0, 1], [2, 3], [4]],
      [
        [0, 1],
        [0, 2],
        [1, 2],
      ],
    )
    const { edges } = buildScene(input({ geometry: chainGeometry(HAND_DRAWN, all) }))
    const upright = edges.find(({ x1, x2, chain }) => x1 === 5 && x2 === 5 && chain === 2)!
    // It reaches lines 0 and 1; at x = 5 the level band lies over it on line 1 only.
    expect(upright.gaps).toEqual([1])
  })

  it('rings the couplers of the focus, dims the rest and orders all by weight', () => {
    const { edges, nodes } = buildScene(input({ focused: 2 }))
    expect(nodes.filter(({ shape }) => shape === 'circle').map(({ x, y }) => [x, y])).toEqual([[5, 0]])
    const level = (chain: number) => edges.find((edge) => edge.chain === chain)!
    expect(level(1).color).toBe(tokens.rule)
    expect(level(2).outline).toBe(1)
    expect(level(1).z).toBeLessThan(level(0).z)
    expect(level(0).z).toBeLessThan(level(2).z)
    expect(level(2).size).toBeGreaterThan(level(0).size)
  })

  it('outlines what is selected at full width, and keeps dots off the chain whose couplers are ringed', () => {
    const dotted = { hue: new Uint8Array(3), inlay: Uint8Array.of(2, 2, 2) }
    const { edges } = buildScene(input({ focused: 2, selected: new Set([1]), hues: dotted }))
    const of = (chain: number) => edges.find((edge) => edge.chain === chain)!
    expect([of(0).outline, of(1).outline, of(2).outline]).toEqual([0, 1, 1])
    expect(of(1).size).toBeGreaterThan(of(0).size)
    expect([of(0).inlay, of(1).inlay, of(2).inlay]).toEqual([2, 2, 0])
  })
})

describe('load', () => {
  it('fills each qubit from its lower end and hatches what is nearly full', () => {
    const load = { qubitLoad: Float32Array.of(0.5, 0.95, 0, 0, 1) }
    const { edges } = buildScene(input({ lens: 'load', load }))
    const tubes = edges.filter(({ kind }) => kind === EDGE_KINDS.tube)
    expect(tubes).toHaveLength(5)
    const [first, second] = tubes
    expect(first!.value).toBeCloseTo(first!.from + first!.span / 2, 4)
    expect(first!.inlay).not.toBe(HATCH)
    expect(second!.inlay).toBe(HATCH)
    expect(second!.color).toBe(tokens.ochre)
  })
})

describe('breaks', () => {
  const breaks = {
    chainRate: Float64Array.of(0.3, 0.01, 0),
    couplerRate: new Map([
      [0, 0.3],
      [3, 0.01],
    ]),
    reads: 100,
  }

  it('dashes couplers that disagreed in at least 2 % of the reads', () => {
    const scene = buildScene(input({ lens: 'breaks', breaks }))
    expect(scene.breaks).toEqual([{ chain: 0, coupler: 0, rate: 0.3, x: 2.5, y: 0 }])
    const dashes = scene.edges.filter(({ kind }) => kind === EDGE_KINDS.dash)
    expect(dashes).toHaveLength(3)
    expect(dashes.every(({ color }) => color === tokens.clay)).toBe(true)
  })

  it('takes rates by coupler index as well', () => {
    const couplerRate = new Float64Array(6)
    couplerRate[3] = 0.5
    expect(buildScene(input({ lens: 'breaks', breaks: { ...breaks, couplerRate } })).breaks).toHaveLength(1)
  })

  it('shows one read as glyphs, with the couplers that disagree in it', () => {
    const read = { spins: Int8Array.of(1, -1, -1, -1, 0) }
    const scene = buildScene(input({ lens: 'breaks', breaks, read }))
    expect(scene.nodes.filter(({ shape }) => shape === 'up' || shape === 'down').map(({ shape }) => shape)).toEqual([
      'up',
      'down',
      'down',
      'down',
    ])
    expect(scene.breaks.map(({ coupler }) => coupler)).toEqual([0])
  })
})

describe('lattices of points', () => {
  const data = latticeOf({ kind: 'king', width: 2, height: 2 })
  const two = layerOf([[0, 1], [2]], [[0, 1]])
  const points = (more: Partial<SceneInput> = {}) =>
    buildScene(input({ data, geometry: chainGeometry(data, two), ...more }))

  it('draws qubits as discs and chains along their couplers', () => {
    const { nodes, edges } = points()
    expect(nodes.map(({ shape, x, y }) => [shape, x, y])).toEqual([
      ['circle', 0, 0],
      ['circle', 1, 0],
      ['circle', 0, 1],
    ])
    expect(edges.map(({ x1, y1, x2, y2 }) => [x1, y1, x2, y2])).toEqual([[0, 0, 1, 0]])
  })

  it('fills rings from within by load, and dashes the coupler that broke', () => {
    const load = { qubitLoad: Float32Array.of(0.5, 0.95, 0.1, 0) }
    const { nodes } = points({ lens: 'load', load })
    expect(nodes[1]!.size).toBeCloseTo(nodes[0]!.size / 2, 5)
    expect(nodes[3]!.color).toBe(tokens.ochre)
    const read = { spins: Int8Array.of(1, -1, 1, 0) }
    const scene = points({ lens: 'breaks', read })
    expect(scene.edges.filter(({ kind }) => kind === EDGE_KINDS.dash)).toHaveLength(1)
  })
})

describe('tails and graph', () => {
  it('groups the thin lines of used qubits by colour', () => {
    const tails = tailsOf(input({ focused: 2 }))
    expect(tails[0]).toEqual({ color: tokens.rule, qubits: [2, 3] })
    expect(tails.flatMap(({ qubits }) => qubits).sort()).toEqual([0, 1, 2, 3, 4])
  })

  it('turns the scene into a graph with shared points and y upwards', () => {
    const scene = buildScene(input())
    const graph = sceneGraph(scene)
    expect(graph.size).toBe(scene.edges.length)
    expect(graph.order).toBe(2 * scene.edges.length + scene.nodes.length + 1)
    expect(graph.getNodeAttributes('mark 0')).toMatchObject({ x: 1, y: -1, shape: 'square' })
  })
})
