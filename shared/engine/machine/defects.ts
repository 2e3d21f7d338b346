import { edgeBetween } from '../graph/build'
import { sizeOf } from '../graph/graph'
import { keepEdges } from '../graph/subgraph'
import type { Defects, Fabric, WorkingGraph } from './fabric'
import { familyName } from './family'
import { indexById } from './index-of'

export { formatDefectText, parseDefectText } from './defect-text'

/** A part of a defect list that does not fit the fabric; `path` is such as `qubits.3` or `couplers.0`. */
export interface DefectIssue {
  readonly path: string
  readonly message: string
}

type IndexOf = (id: number) => number

const qubitIssue = (fabric: Fabric, indexOf: IndexOf, id: number): string | null =>
  indexOf(id) < 0 ? `${familyName(fabric.family)} has no qubit ${id}` : null

function couplerIssue(fabric: Fabric, indexOf: IndexOf, [a, b]: readonly [number, number]): string | null {
  const unknown = qubitIssue(fabric, indexOf, a) ?? qubitIssue(fabric, indexOf, b)
  if (unknown !== null) return unknown
  if (a === b) return `${a}-${b}: a coupler joins two different qubits`
  if (edgeBetween(fabric.graph, indexOf(a), indexOf(b)) >= 0) return null
  return `${familyName(fabric.family)} has no coupler ${a}-${b}`
}

/** Every entry of the list that names a qubit or a coupler which the family does not have. Repeats are no issue. */
export function defectIssues(fabric: Fabric, defects: Defects): DefectIssue[] {
  const indexOf = indexById(fabric)
  const issues: DefectIssue[] = []
  const note = (path: string, message: string | null): void => {
    if (message !== null) issues.push({ path, message })
  }
  defects.qubits.forEach((id, k) => note(`qubits.${k}`, qubitIssue(fabric, indexOf, id)))
  defects.couplers.forEach((pair, k) => note(`couplers.${k}`, couplerIssue(fabric, indexOf, pair)))
  return issues
}

function refuseUnknown(fabric: Fabric, defects: Defects): void {
  const [issue] = defectIssues(fabric, defects)
  if (issue !== undefined) throw new RangeError(`${issue.path}: ${issue.message}`)
}

/**
 * The machine that is left when the defects are taken out. Vertices keep their dense indices; edges are numbered anew.
 * @throws RangeError when `defectIssues` would find any
 */
export function applyDefects(fabric: Fabric, defects: Defects): WorkingGraph {
  refuseUnknown(fabric, defects)
  const { graph } = fabric
  const indexOf = indexById(fabric)
  const usable = new Uint8Array(graph.order).fill(1)
  const works = new Uint8Array(sizeOf(graph)).fill(1)
  for (const id of defects.qubits) usable[indexOf(id)] = 0
  for (const [a, b] of defects.couplers) works[edgeBetween(graph, indexOf(a), indexOf(b))] = 0
  for (let k = 0; k < works.length; k++)
    if (usable[graph.ends[2 * k]!] === 0 || usable[graph.ends[2 * k + 1]!] === 0) works[k] = 0
  return { graph: keepEdges(graph, works), usable }
}

/**
 * The one way of writing a defect list: ascending, without repeats, couplers with the lower number first and sorted,
 * without the couplers of missing qubits. Equal machines have equal lists.
 * @throws RangeError when `defectIssues` would find any
 */
export function normaliseDefects(fabric: Fabric, defects: Defects): Defects {
  refuseUnknown(fabric, defects)
  const missing = new Set(defects.qubits)
  const couplers = defects.couplers
    .filter(([a, b]) => !missing.has(a) && !missing.has(b))
    .map(([a, b]): [number, number] => (a < b ? [a, b] : [b, a]))
    .sort(([a, b], [c, d]) => a - c || b - d)
    .filter(([a, b], k, all) => k === 0 || all[k - 1]![0] !== a || all[k - 1]![1] !== b)
  return { qubits: [...missing].sort((a, b) => a - b), couplers }
}
