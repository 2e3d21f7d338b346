import type { Graph } from '../../graph/graph'
import { degreeOf } from '../../graph/graph'
import type { Random } from '../../random'
import { connectedParts } from '../parts'
import { estimatedQubits, placeProblem } from '../placement'
import { Ground } from './ground'
import type { ChainState } from './state'

/**
 * How much the middle of a full machine is stretched at the cost of its rim: ways between others lead through the
 * middle, which would be crowded while the rim has qubits left.
 */
const STRETCH = 0.3

/** A coordinate in (0, 1), moved away from the middle; rises from 0 to 1. */
const stretched = (x: number): number => x - (STRETCH * Math.sin(2 * Math.PI * x)) / (2 * Math.PI)

/**
 * Chooses for each connected part of the problem one of the machine's, largest first and at random in proportion to
 * the room left in those that can take it (the one with most room when none can). Returns the machine part by
 * problem part; −1 where the machine has no qubit.
 */
function assignParts(needs: readonly number[], rooms: readonly number[], random: Random): Int32Array {
  const left = [...rooms]
  const chosen = new Int32Array(needs.length).fill(-1)
  const bySize = needs.map((_, i) => i).sort((a, b) => needs[b]! - needs[a]! || a - b)
  for (const i of bySize) {
    const fitting = left.reduce((sum, room) => sum + (room >= needs[i]! ? room : 0), 0)
    let ticket = fitting > 0 ? random.below(fitting) : -1
    let pick = left.indexOf(left.reduce((most, room) => Math.max(most, room), 0))
    for (let part = 0; part < left.length && ticket >= 0; part++) {
      if (left[part]! < needs[i]!) continue
      pick = part
      ticket -= left[part]!
    }
    chosen[i] = pick
    if (pick >= 0) left[pick]! -= needs[i]!
  }
  return chosen
}

/** Variables with interactions that go to one connected part of the machine, and that part's ground. */
interface Plot {
  readonly ground: Ground
  readonly variables: Int32Array
  readonly need: number
}

/** What is known before any random choice: parts and grounds. Made once for all rounds of a try. */
export class Seeds {
  private readonly problemParts
  private readonly machineParts
  private readonly grounds = new Map<number, Ground>()

  constructor(
    private readonly problem: Graph,
    machine: Graph,
    private readonly usable: Uint8Array,
    private readonly segments: Float32Array,
  ) {
    this.problemParts = connectedParts(problem)
    this.machineParts = connectedParts(machine, usable)
  }

  /** Estimated qubits that the variables with interactions take. */
  get need(): number {
    const { problem } = this
    let need = 0
    for (let v = 0; v < problem.order; v++) if (degreeOf(problem, v) > 0) need += estimatedQubits(degreeOf(problem, v))
    return need
  }

  /** Usable qubits. */
  get room(): number {
    return this.machineParts.sizes.reduce((sum, size) => sum + size, 0)
  }

  private groundOf(part: number): Ground {
    const { partOf } = this.machineParts
    const ground =
      this.grounds.get(part) ??
      new Ground(
        this.segments,
        this.usable.map((works, q) => (works && partOf[q] === part ? 1 : 0)),
      )
    this.grounds.set(part, ground)
    return ground
  }

  private plots(random: Random): Plot[] {
    const { problem, problemParts, machineParts } = this
    const chosen = assignParts(problemParts.sizes, machineParts.sizes, random)
    const members = new Map<number, number[]>()
    for (let v = 0; v < problem.order; v++) {
      const part = chosen[problemParts.partOf[v]!]!
      if (degreeOf(problem, v) === 0 || part < 0) continue
      const list = members.get(part) ?? []
      list.push(v)
      members.set(part, list)
    }
    return [...members].map(([part, variables]) => ({
      ground: this.groundOf(part),
      variables: Int32Array.from(variables),
      need: variables.reduce((sum, v) => sum + estimatedQubits(degreeOf(problem, v)), 0),
    }))
  }

  /**
   * Gives each variable with interactions one qubit, free while there are free ones, so that variables that interact
   * lie near each other.
   * @param effort factor on the work of placing
   * @param slack factor on the estimated need that decides how much of the machine is taken
   */
  sow(state: ChainState, random: Random, effort: number, slack: number, shouldStop: () => boolean): void {
    for (const { ground, variables, need } of this.plots(random)) {
      const columns = Math.max(1, Math.ceil(Math.sqrt(variables.length * ground.aspect)))
      const rows = Math.ceil(variables.length / columns)
      const options = { columns, rows, effort }
      const { x, y } = placeProblem(this.problem, variables, random, options, shouldStop)
      const share = Math.sqrt(Math.min(1, (slack * need) / ground.usable))
      const at = share < 1 ? (coordinate: number): number => coordinate : stretched
      for (const v of variables) state.add(v, ground.nearest(at(x[v]!), at(y[v]!), share, state.use))
    }
  }
}
