import iterate from 'graphology-layout-forceatlas2/iterate'
import { createRandom } from '../../shared/engine/random'

/**
 * ForceAtlas2 (Jacomy, Venturini, Heymann & Bastian, PLoS ONE 9:e98679, 2014) step by step: the same problem and seed
 * give the same picture, however the steps are sliced.
 */
export interface LayoutTask {
  readonly variables: number
  readonly rows: Uint32Array
  readonly cols: Uint32Array
  /** Pull of each interaction, above 0. */
  readonly pulls: Float64Array
  readonly seed: number
  /** Where to go on from, x and y of each variable; placed at random in a disc without. */
  readonly start: ArrayLike<number> | null
}

export interface ForceLayout {
  /** Moves all variables once; gives the mean way of a variable as a share of the extent of the picture. */
  step(): number
  /** x and y of each variable. */
  positions(): Float32Array
}

export const LAYOUT_DEFAULTS = {
  /** Steps of a layout: fewer for larger problems, which take longer a step. */
  steps: { most: 600, least: 250, budget: 300_000 },
  /** Mean way of a variable in one step, as a share of the extent, at which the picture has settled. */
  settled: 2e-5,
  /** Variables from which far ones repel as groups (Barnes & Hut, Nature 324:446, 1986). */
  groupFrom: 400,
  /** Pull of the weakest interaction as a share of the strongest. */
  leastPull: 0.15,
  discRadius: 100,
}

/** What graphology's ForceAtlas2 keeps of a node and an edge in its matrices. */
const NODE = { length: 10, x: 0, y: 1, mass: 6, convergence: 7, size: 8 }
const EDGE = { length: 3, weight: 2 }

export const stepsFor = (variables: number): number => {
  const { most, least, budget } = LAYOUT_DEFAULTS.steps
  return Math.round(Math.max(least, Math.min(most, budget / Math.max(1, variables))))
}

/** Pull of each interaction from the sizes of its coefficient: the root evens out what differs by orders. */
export function pullsOf(values: Float64Array): Float64Array {
  const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0) || 1
  const { leastPull } = LAYOUT_DEFAULTS
  return values.map((value) => leastPull + (1 - leastPull) * Math.sqrt(Math.abs(value) / largest))
}

export function createForceLayout(task: LayoutTask): ForceLayout {
  const nodes = nodeMatrix(task)
  const edges = edgeMatrix(task, nodes)
  const settings = {
    adjustSizes: false,
    barnesHutOptimize: task.variables >= LAYOUT_DEFAULTS.groupFrom,
    barnesHutTheta: 0.6,
    edgeWeightInfluence: 1,
    gravity: 0.05,
    linLogMode: false,
    outboundAttractionDistribution: false,
    scalingRatio: 10,
    slowDown: 1 + Math.log(Math.max(1, task.variables)),
    strongGravityMode: true,
  }
  const positions = () => {
    const found = new Float32Array(2 * task.variables)
    for (let i = 0; i < task.variables; i++) {
      found[2 * i] = nodes[NODE.length * i + NODE.x]!
      found[2 * i + 1] = nodes[NODE.length * i + NODE.y]!
    }
    return found
  }
  return {
    positions,
    step() {
      const before = positions()
      iterate(settings, nodes, edges)
      return meanWay(before, positions())
    },
  }
}

function nodeMatrix({ variables, seed, start }: LayoutTask): Float64Array {
  const random = createRandom(seed)
  const nodes = new Float64Array(NODE.length * variables)
  for (let i = 0; i < variables; i++) {
    const radius = LAYOUT_DEFAULTS.discRadius * Math.sqrt(random.float())
    const angle = 2 * Math.PI * random.float()
    const at = NODE.length * i
    nodes[at + NODE.x] = start ? start[2 * i]! : radius * Math.cos(angle)
    nodes[at + NODE.y] = start ? start[2 * i + 1]! : radius * Math.sin(angle)
    nodes[at + NODE.mass] = 1
    nodes[at + NODE.convergence] = 1
    nodes[at + NODE.size] = 1
  }
  return nodes
}

/** The interactions, each of which adds its pull to the mass of both variables. */
function edgeMatrix({ rows, cols, pulls }: LayoutTask, nodes: Float64Array): Float64Array {
  const edges = new Float64Array(EDGE.length * rows.length)
  for (let k = 0; k < rows.length; k++) {
    const ends = [NODE.length * rows[k]!, NODE.length * cols[k]!]
    ends.forEach((node, end) => {
      edges[EDGE.length * k + end] = node
      nodes[node + NODE.mass]! += pulls[k]!
    })
    edges[EDGE.length * k + EDGE.weight] = pulls[k]!
  }
  return edges
}

function meanWay(before: Float32Array, after: Float32Array): number {
  let sum = 0
  let [x1, y1, x2, y2] = [Infinity, Infinity, -Infinity, -Infinity]
  for (let at = 0; at < after.length; at += 2) {
    const x = after[at]!
    const y = after[at + 1]!
    sum += Math.hypot(x - before[at]!, y - before[at + 1]!)
    x1 = Math.min(x1, x)
    y1 = Math.min(y1, y)
    x2 = Math.max(x2, x)
    y2 = Math.max(y2, y)
  }
  const extent = Math.max(x2 - x1, y2 - y1)
  return extent > 0 ? sum / (after.length / 2) / extent : 0
}
