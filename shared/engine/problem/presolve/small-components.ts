/** Components of what is left that are small enough to try every state: exact, whatever the size of the coefficients. */
import { groundStates } from '../enumerate'
import { toNumber } from './dyadic'
import type { Step } from './record'
import { TABLES } from './record'
import type { WorkingProblem } from './working-problem'

export const COMPONENT_LIMITS = {
  /** Variables of a component that is solved. */
  variables: 20,
  /** The same where the coefficients are beyond the whole numbers of doubles: such a step takes ten times as long. */
  variablesBeyondDoubles: 16,
  /** States tried in all, about a second of work; smaller components come first. */
  states: 2 ** 26,
}
export type ComponentLimits = typeof COMPONENT_LIMITS

/** Whole numbers up to this, summed over a component, stay exact through the enumeration in doubles. */
const EXACT_SUM = 2n ** 48n

/** Components by size, then by lowest variable; each with its variables ascending. O(variables + interactions left). */
export function componentsLeft(working: WorkingProblem): Uint32Array[] {
  const isSeen = new Uint8Array(working.n)
  const components: Uint32Array[] = []
  for (let start = 0; start < working.n; start++) {
    if (working.isLeft[start] === 0 || isSeen[start] === 1) continue
    const members = [start]
    isSeen[start] = 1
    for (let head = 0; head < members.length; head++)
      for (const j of working.pairs[members[head]!]!.keys()) {
        if (isSeen[j] === 1) continue
        isSeen[j] = 1
        members.push(j)
      }
    components.push(Uint32Array.from(members).sort())
  }
  return components.sort((a, b) => a.length - b.length || a[0]! - b[0]!)
}

interface Block {
  readonly linear: bigint[]
  readonly rows: number[]
  readonly cols: number[]
  readonly values: bigint[]
}

function blockOf(working: WorkingProblem, members: Uint32Array): Block {
  const place = new Map(Array.from(members, (v, k) => [v, k]))
  const block: Block = { linear: Array.from(members, (v) => working.linear[v]!), rows: [], cols: [], values: [] }
  for (const v of members)
    for (const [j, value] of working.pairs[v]!) {
      if (j < v) continue
      block.rows.push(place.get(v)!)
      block.cols.push(place.get(j)!)
      block.values.push(value)
    }
  return block
}

const fitsDoubles = ({ linear, values }: Block): boolean =>
  [...linear, ...values].reduce((sum, value) => sum + (value < 0n ? -value : value), 0n) < EXACT_SUM

/** A state of least energy, by enumeration in doubles that hold whole numbers. */
function solveInDoubles({ linear, rows, cols, values }: Block): number[] {
  const n = linear.length
  const problem = {
    n,
    linear: Float64Array.from(linear, Number),
    rows: Uint32Array.from(rows),
    cols: Uint32Array.from(cols),
    values: Float64Array.from(values, Number),
    offset: 0,
  }
  return Array.from(groundStates(problem, 'qubo', n).states[0]!)
}

/** The first state of least energy in Gray-code order, in integers of any size. */
function solveInIntegers({ linear, rows, cols, values }: Block): number[] {
  const n = linear.length
  const partners: [number, bigint][][] = linear.map(() => [])
  values.forEach((value, k) => {
    partners[rows[k]!]!.push([cols[k]!, value])
    partners[cols[k]!]!.push([rows[k]!, value])
  })
  const state = new Array<number>(n).fill(0)
  const change = [...linear]
  let energy = 0n
  let best = 0n
  let bestState = [...state]
  for (let step = 1; step < 2 ** n; step++) {
    const v = 31 - Math.clz32(step & -step)
    const isOn = state[v] === 0
    energy += isOn ? change[v]! : -change[v]!
    state[v] = isOn ? 1 : 0
    for (const [j, value] of partners[v]!) change[j]! += isOn ? value : -value
    if (energy >= best) continue
    best = energy
    bestState = [...state]
  }
  return bestState
}

function energyOf({ linear, rows, cols, values }: Block, state: readonly number[]): bigint {
  let energy = 0n
  linear.forEach((a, i) => (energy += state[i] === 1 ? a : 0n))
  values.forEach((b, k) => (energy += state[rows[k]!] === 1 && state[cols[k]!] === 1 ? b : 0n))
  return energy
}

/** Solves and fixes small components, smaller ones first, within the limits. Each step is added to `steps`. */
export function solveSmallComponents(
  working: WorkingProblem,
  steps: Step[],
  limits: ComponentLimits,
  shouldStop: () => boolean,
): void {
  let { states } = limits
  for (const members of componentsLeft(working)) {
    if (members.length > limits.variables || shouldStop()) return
    const block = blockOf(working, members)
    const isPlain = fitsDoubles(block)
    if (!isPlain && members.length > limits.variablesBeyondDoubles) continue
    states -= 2 ** members.length
    if (states < 0) return
    const state = isPlain ? solveInDoubles(block) : solveInIntegers(block)
    const quantities = [members.length, toNumber(energyOf(block, state), working.unit)]
    members.forEach((variable, k) => {
      const value = state[k] === 1 ? 1 : 0
      working.assign(variable, value)
      steps.push({ rule: 'component', variable, table: value === 1 ? TABLES.one : TABLES.zero, quantities })
    })
  }
}
