import type { Components } from '../components'
import { connectedComponents } from '../components'
import { interactionGraph } from '../interaction-graph'
import type { Problem } from '../problem'

/** A connected component of a problem as a problem of its own, in the same form, without offset. */
interface Component {
  /** Its variables in the whole problem, ascending. */
  readonly variables: Uint32Array
  readonly problem: Problem
}

/** Members of each component, one after the other: those of c stand at offsets[c] … offsets[c + 1] − 1, ascending. */
function membersOf({ count, componentOf }: Components): { offsets: Uint32Array; members: Uint32Array } {
  const offsets = new Uint32Array(count + 1)
  for (const c of componentOf) offsets[c + 1]!++
  for (let c = 0; c < count; c++) offsets[c + 1]! += offsets[c]!
  const next = offsets.slice(0, count)
  const members = new Uint32Array(componentOf.length)
  componentOf.forEach((c, v) => (members[next[c]!++] = v))
  return { offsets, members }
}

/** The components of a problem, isolated variables too, in time linear in the problem. */
export function splitComponents(problem: Problem): Component[] {
  const components = connectedComponents(interactionGraph(problem))
  const { componentOf, count } = components
  const { offsets, members } = membersOf(components)
  const placeOf = new Uint32Array(problem.n)
  for (let c = 0; c < count; c++)
    for (let p = offsets[c]!; p < offsets[c + 1]!; p++) placeOf[members[p]!] = p - offsets[c]!
  const interactions = new Uint32Array(count + 1)
  for (const row of problem.rows) interactions[componentOf[row]! + 1]!++
  for (let c = 0; c < count; c++) interactions[c + 1]! += interactions[c]!
  const next = interactions.slice(0, count)
  const size = problem.values.length
  const [rows, cols, values] = [new Uint32Array(size), new Uint32Array(size), new Float64Array(size)]
  // Pairs are sorted, and places ascend with variables: they stay sorted in each component.
  for (let k = 0; k < size; k++) {
    const at = next[componentOf[problem.rows[k]!]!]!++
    rows[at] = placeOf[problem.rows[k]!]!
    cols[at] = placeOf[problem.cols[k]!]!
    values[at] = problem.values[k]!
  }
  return Array.from({ length: count }, (_, c) => {
    const variables = members.slice(offsets[c], offsets[c + 1])
    const [from, to] = [interactions[c], interactions[c + 1]]
    return {
      variables,
      problem: {
        n: variables.length,
        linear: Float64Array.from(variables, (v) => problem.linear[v]!),
        rows: rows.slice(from, to),
        cols: cols.slice(from, to),
        values: values.slice(from, to),
        offset: 0,
      },
    }
  })
}
