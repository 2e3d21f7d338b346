import { degreeOf } from '../graph/graph'
import { connectedComponents } from './components'
import { countDistinct, histogram, type HistogramBin } from './histogram'
import { interactionGraph } from './interaction-graph'
import type { Problem } from './problem'
import { treewidthUpperBound } from './treewidth'

const DEFAULTS = { bins: 24 }

/** What a problem looks like before anything is done with it. */
export interface StructureReport {
  readonly variables: number
  readonly interactions: number
  /** Interactions over n(n − 1)/2; 0 for fewer than two variables. */
  readonly density: number
  /** Interactions at a variable; all 0 when there are no variables. */
  readonly degree: { readonly min: number; readonly mean: number; readonly max: number }
  readonly degreeHistogram: readonly { readonly value: number; readonly count: number }[]
  /** Nonzero linear coefficients, at most 24 bins; see `histogram`. */
  readonly linearHistogram: readonly HistogramBin[]
  /** Interaction values, at most 24 bins. */
  readonly interactionHistogram: readonly HistogramBin[]
  /** Least nonzero and greatest size among all coefficients, the offset left out; null when every one is zero. */
  readonly coefficientSizes: { readonly least: number; readonly greatest: number } | null
  /** The greatest of them over the least. */
  readonly dynamicRange: number | null
  /** Connected components, isolated variables counted. */
  readonly components: number
  /** Variables without interactions. */
  readonly isolated: number
  /** By least fill; null when the graph is too large for a quick answer (see `treewidthUpperBound`). */
  readonly treewidthUpperBound: number | null
}

function coefficientSizes(linear: Float64Array, values: Float64Array): StructureReport['coefficientSizes'] {
  let least = Infinity
  let greatest = 0
  for (const list of [linear, values])
    for (const value of list) {
      const size = Math.abs(value)
      if (size === 0) continue
      least = Math.min(least, size)
      greatest = Math.max(greatest, size)
    }
  return greatest === 0 ? null : { least, greatest }
}

/** The structure report of a problem in the form it is given in. Well under a second for a million interactions. */
export function structureOf(problem: Problem): StructureReport {
  const { n, linear, values } = problem
  const graph = interactionGraph(problem)
  const degrees = Uint32Array.from({ length: n }, (_, v) => degreeOf(graph, v))
  const degreeHistogram = countDistinct(degrees) ?? []
  const components = connectedComponents(graph)
  const sizes = coefficientSizes(linear, values)
  return {
    variables: n,
    interactions: values.length,
    density: n < 2 ? 0 : values.length / ((n * (n - 1)) / 2),
    degree: {
      min: degreeHistogram.at(0)?.value ?? 0,
      mean: n === 0 ? 0 : (2 * values.length) / n,
      max: degreeHistogram.at(-1)?.value ?? 0,
    },
    degreeHistogram,
    linearHistogram: histogram(
      linear.filter((value) => value !== 0),
      DEFAULTS.bins,
    ),
    interactionHistogram: histogram(values, DEFAULTS.bins),
    coefficientSizes: sizes,
    dynamicRange: sizes && sizes.greatest / sizes.least,
    components: components.count,
    isolated: components.isolated,
    treewidthUpperBound: treewidthUpperBound(graph),
  }
}
