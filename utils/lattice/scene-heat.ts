import { SCENE_DEFAULTS } from './scene-types'
import type { Draft, SceneInput } from './scene-types'
import { edgeFrom } from './strokes'
import { mixColours } from './tokens'
import type { Tokens } from './tokens'
import type { HeatLayer } from './types'

/** Upper ends of the classes of rate, shares of reads; the last class has none. */
export const HEAT_BOUNDS = [0, 0.01, 0.05, 0.2] as const
export const HEAT_CLASSES = HEAT_BOUNDS.length + 1

/** Class of a rate: 0 never, then up to each bound. */
export function heatClass(rate: number): number {
  const at = HEAT_BOUNDS.findIndex((bound) => rate <= bound)
  return at < 0 ? HEAT_BOUNDS.length : at
}

/** From pale to dark by class, so that the order shows without the hue; each is broader than the one before as well. */
export const heatColours = ({ clay, ink, edge, paper }: Pick<Tokens, 'clay' | 'ink' | 'edge' | 'paper'>): string[] => [
  edge,
  mixColours(clay, paper, 0.5),
  mixColours(clay, paper, 0.2),
  mixColours(clay, ink, 0.25),
  mixColours(clay, ink, 0.6),
]

export const HEAT_WIDTHS = [0.12, 0.3, 0.55, 0.85, 1.2] as const

/** Nothing of it belongs to a chain. */
const NO_CHAIN = -1
const QUBIT_LEVEL = 10
const COUPLER_LEVEL = 20

/** Breaks by part: every measured qubit a line, every measured coupler a square or a bridge, darker and broader the oftener. */
export function addHeat(input: SceneInput, heat: HeatLayer, isOfPoints: boolean, draft: Draft): void {
  const colours = heatColours(input.tokens)
  addQubits(input, heat, isOfPoints, colours, draft)
  addCouplers(input, heat, isOfPoints, colours, draft)
}

const strokeAt = (points: Float32Array, k: number) => ({
  x1: points[4 * k]!,
  y1: points[4 * k + 1]!,
  x2: points[4 * k + 2]!,
  y2: points[4 * k + 3]!,
})

function addQubits(
  { data: { segments } }: SceneInput,
  { qubits, qubitRates }: HeatLayer,
  isOfPoints: boolean,
  colours: readonly string[],
  { edges, nodes }: Draft,
): void {
  qubits.forEach((q, k) => {
    const step = heatClass(qubitRates[k]!)
    const { x1, y1, x2, y2 } = strokeAt(segments, q)
    const color = colours[step]!
    if (isOfPoints) {
      const size = SCENE_DEFAULTS.discSize * (0.4 + 0.15 * step)
      nodes.push({ x: x1, y: y1, shape: 'circle', size, color, rim: color, rimWidth: 0, halo: 0, chain: NO_CHAIN })
      return
    }
    const stroke = { x1, y1, x2, y2, chain: NO_CHAIN }
    edges.push(edgeFrom(stroke, 'line', { size: HEAT_WIDTHS[step]!, color, z: QUBIT_LEVEL + step }))
  })
}

function addCouplers(
  { data: { places } }: SceneInput,
  { couplers, couplerRates }: HeatLayer,
  isOfPoints: boolean,
  colours: readonly string[],
  { edges, nodes }: Draft,
): void {
  couplers.forEach((c, k) => {
    const step = heatClass(couplerRates[k]!)
    const { x1, y1, x2, y2 } = strokeAt(places, c)
    const color = colours[step]!
    if (x1 === x2 && y1 === y2) {
      const size = 0.35 + 0.3 * step
      nodes.push({ x: x1, y: y1, shape: 'square', size, color, rim: color, rimWidth: 0, halo: 1, chain: NO_CHAIN })
      return
    }
    const size = HEAT_WIDTHS[step]! * (isOfPoints ? 0.8 : 1.2)
    edges.push(
      edgeFrom({ x1, y1, x2, y2, chain: NO_CHAIN }, 'line', { size, color, casing: 1, z: COUPLER_LEVEL + step }),
    )
  })
}
