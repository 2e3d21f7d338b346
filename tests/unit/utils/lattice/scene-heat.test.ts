import { describe, expect, it } from 'vitest'
import { huesOfChains } from '../../../../utils/lattice/hue-conflicts'
import { chainGeometry } from '../../../../utils/lattice/geometry'
import { NO_CHAINS } from '../../../../utils/lattice/no-chains'
import { buildScene } from '../../../../utils/lattice/scene'
import { HEAT_CLASSES, HEAT_WIDTHS, heatClass, heatColours } from '../../../../utils/lattice/scene-heat'
import { contrastOf, readTokens } from '../../../../utils/lattice/tokens'
import type { LatticeData } from '../../../../utils/lattice/types'

/** Two upright qubits on one line, joined end to end, and one lying qubit that crosses the first. */
const data: LatticeData = {
  ids: Uint32Array.of(5, 6, 9),
  segments: Float32Array.of(0, 0, 0, 4, 0, 5, 0, 9, -2, 2, 2, 2),
  usable: Uint8Array.of(1, 1, 1),
  ends: Uint32Array.of(0, 1, 0, 2),
  places: Float32Array.of(0, 4, 0, 5, 0, 2, 0, 2),
}
const dark = (property: string) =>
  ({ '--paper': '#161c19', '--ink': '#e9e6dc', '--clay': '#e08a5c', '--edge': '#6f7a73' })[property] ?? ''

const sceneWith = (qubitRates: number[], couplerRates: number[]) =>
  buildScene({
    data,
    geometry: chainGeometry(data, NO_CHAINS),
    hues: huesOfChains(data, NO_CHAINS),
    tokens: readTokens(() => ''),
    lens: 'occupancy',
    focused: null,
    heat: {
      qubits: Uint32Array.from(qubitRates.keys()),
      qubitRates: Float64Array.from(qubitRates),
      couplers: Uint32Array.from(couplerRates.keys()),
      couplerRates: Float64Array.from(couplerRates),
    },
  })

describe('heat of the lattice', () => {
  it.each([
    [0, 0],
    [0.0001, 1],
    [0.01, 1],
    [0.011, 2],
    [0.05, 2],
    [0.2, 3],
    [0.21, 4],
    [1, 4],
  ])('puts a rate of %d into class %d', (rate, step) => {
    expect(heatClass(rate)).toBe(step)
  })

  it.each([
    ['light', () => ''],
    ['dark', dark],
  ])('gains contrast with paper from class to class that broke, and width, in the %s theme', (_, valueOf) => {
    const tokens = readTokens(valueOf)
    const contrasts = heatColours(tokens).map((colour) => contrastOf(colour, tokens.paper))
    expect(contrasts).toHaveLength(HEAT_CLASSES)
    for (let k = 2; k < HEAT_CLASSES; k++) {
      expect(contrasts[k]!).toBeGreaterThan(contrasts[k - 1]! * 1.15)
      expect(HEAT_WIDTHS[k]!).toBeGreaterThan(1.3 * HEAT_WIDTHS[k - 1]!)
    }
  })

  it('draws qubits as lines from end to end, bridges as lines and crossings as squares', () => {
    const { edges, nodes } = sceneWith([0, 0.5], [0.02, 0.3])
    expect(edges.map(({ x1, y1, x2, y2 }) => [x1, y1, x2, y2])).toEqual([
      [0, 0, 0, 4],
      [0, 5, 0, 9],
      [0, 4, 0, 5],
    ])
    expect(edges[1]!.size).toBeGreaterThan(edges[0]!.size)
    expect(edges[2]!.z).toBeGreaterThan(edges[1]!.z)
    expect(nodes).toMatchObject([{ x: 0, y: 2, shape: 'square' }])
  })

  it('draws nothing of parts that were never measured', () => {
    const { edges, nodes } = sceneWith([], [])
    expect([...edges, ...nodes]).toEqual([])
  })
})
