import { sizeOf } from '../graph/graph'
import { isBalanced, triangles, type Triangles } from './balance'
import { connectedComponents } from './components'
import { convertForm } from './convert'
import { interactionGraph } from './interaction-graph'
import type { Form, Problem } from './problem'
import { symmetriesOf, type Symmetries } from './symmetry'
import { treewidthLowerBound } from './treewidth-lower'

/** Counts of the signs of coefficients. */
interface Signs {
  readonly negative: number
  readonly zero: number
  readonly positive: number
}

/** What takes longer to find out than a person who uploads a problem should wait for. */
export interface StructureDetails {
  /** A proved lower bound on the treewidth; see `treewidthLowerBound`. */
  readonly treewidthLowerBound: number
  /** Sizes of connected components, largest first, with how many there are of each. */
  readonly componentSizes: readonly { readonly variables: number; readonly count: number }[]
  /** Different nonzero values, in the form given. */
  readonly distinct: { readonly linear: number; readonly interactions: number }
  /** Signs of fields and couplings in the Ising form, where they say what a spin wants. */
  readonly fields: Signs
  readonly couplings: Signs
  /** Whether one state satisfies every coupling. */
  readonly balanced: boolean
  /** Null when there are too many to count quickly. */
  readonly triangles: Triangles | null
  readonly symmetries: Symmetries
}

const distinctIn = (values: Float64Array): number => new Set(values.filter((value) => value !== 0)).size

function signsOf(values: Float64Array): Signs {
  let [negative, positive] = [0, 0]
  for (const value of values) {
    if (value < 0) negative++
    if (value > 0) positive++
  }
  return { negative, zero: values.length - negative - positive, positive }
}

/** The slower part of the structure report. A second or two for a million interactions; the effort is counted. */
export function structureDetails(problem: Problem, form: Form): StructureDetails {
  const graph = interactionGraph(problem)
  const ising = convertForm(problem, form, 'ising')
  const { count, componentOf } = connectedComponents(graph)
  const sizes = new Uint32Array(count)
  for (const c of componentOf) sizes[c]!++
  const bySize = new Map<number, number>()
  for (const size of sizes) bySize.set(size, (bySize.get(size) ?? 0) + 1)
  return {
    treewidthLowerBound: sizeOf(graph) === 0 ? 0 : treewidthLowerBound(graph),
    componentSizes: [...bySize]
      .map(([variables, times]) => ({ variables, count: times }))
      .sort((a, b) => b.variables - a.variables),
    distinct: { linear: distinctIn(problem.linear), interactions: distinctIn(problem.values) },
    fields: signsOf(ising.linear),
    couplings: signsOf(ising.values),
    balanced: isBalanced(graph, ising.values),
    triangles: triangles(graph, ising.values),
    symmetries: symmetriesOf(graph, ising),
  }
}
