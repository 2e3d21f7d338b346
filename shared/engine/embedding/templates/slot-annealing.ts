import type { Graph } from '../../graph/graph'
import type { Random } from '../../random'
import type { Watch } from '../progress'
import { FIRST_ARM, SECOND_ARM } from './template'
import type { Template } from './template'

const DEFAULTS = {
  /** Cost of an interaction between slots that do not meet, in squared qubits. */
  unmet: 400,
  /** First and last temperature, in squared qubits. */
  hot: 40,
  cold: 1,
  /** Moves a variable, cut down so that the work stays below `mostWork` steps. */
  movesPerVariable: 1000,
  mostWork: 3e7,
}

const MOVES_PER_LOOK = 256

/**
 * Anneals which variable takes which slot of a template, so that chains can be cut short. A variable costs the square of
 * the qubits that its arms need to reach its partners, which also keeps the longest chains down.
 */
export class SlotAnnealer {
  /** By variable. */
  readonly slotOf: Int32Array
  private readonly variableAt: Int32Array
  private readonly costOf: Int32Array
  private readonly affected: Int32Array
  private readonly isAffected: Uint32Array
  private affectedNow = 0
  private readonly saved: Int32Array
  private readonly state = new Int32Array(1)

  /** @param slotOf a slot for each variable, none taken twice; −1 leaves a variable out */
  constructor(
    private readonly problem: Graph,
    private readonly template: Template,
    slotOf: Int32Array,
    random: Random,
  ) {
    const n = problem.order
    this.slotOf = slotOf.slice()
    this.variableAt = new Int32Array(template.slots).fill(-1)
    this.costOf = new Int32Array(n)
    for (let i = 0; i < n; i++) {
      if (slotOf[i]! < 0) continue
      this.variableAt[slotOf[i]!] = i
      this.costOf[i] = this.evaluate(i)
    }
    this.affected = new Int32Array(n)
    this.isAffected = new Uint32Array(n)
    this.saved = new Int32Array(n)
    this.state[0] = random.uint32() | 1
  }

  get cost(): number {
    return this.costOf.reduce((sum, cost) => sum + cost, 0)
  }

  private evaluate(variable: number): number {
    const { problem, slotOf } = this
    const { slots, armTo, placeTo, corners } = this.template
    const slot = slotOf[variable]!
    let [first0, last0, first1, last1, unmet] = [1 << 30, -1, 1 << 30, -1, 0]
    const end = problem.offsets[variable + 1]!
    for (let p = problem.offsets[variable]!; p < end; p++) {
      const partner = slotOf[problem.targets[p]!]!
      if (partner < 0) continue
      const entry = slot * slots + partner
      const arm = armTo[entry]!
      const place = placeTo[entry]!
      if (arm === FIRST_ARM) {
        if (place < first0) first0 = place
        if (place > last0) last0 = place
      } else if (arm === SECOND_ARM) {
        if (place < first1) first1 = place
        if (place > last1) last1 = place
      } else unmet++
    }
    const both = last0 >= 0 && last1 >= 0 && corners[2 * slot]! >= 0
    const [corner0, corner1] = [corners[2 * slot]!, corners[2 * slot + 1]!]
    if (both) {
      if (corner0 < first0) first0 = corner0
      if (corner0 > last0) last0 = corner0
      if (corner1 < first1) first1 = corner1
      if (corner1 > last1) last1 = corner1
    }
    const length = (last0 < 0 ? 0 : last0 - first0 + 1) + (last1 < 0 ? 0 : last1 - first1 + 1)
    return length * length + unmet * DEFAULTS.unmet
  }

  /** xorshift32 (Marsaglia, Xorshift RNGs, 2003), begun from the given random numbers. */
  private below(bound: number): number {
    let x = this.state[0]!
    x ^= x << 13
    x ^= x >>> 17
    x ^= x << 5
    this.state[0] = x
    return Math.floor(((x >>> 0) / 4294967296) * bound)
  }

  /** Adds a variable and its partners to the affected ones; −1 adds nothing. Returns the new count. */
  private affect(variable: number, count: number): number {
    if (variable < 0) return count
    const { problem, affected, isAffected, affectedNow } = this
    if (isAffected[variable] !== affectedNow) {
      isAffected[variable] = affectedNow
      affected[count++] = variable
    }
    for (let p = problem.offsets[variable]!; p < problem.offsets[variable + 1]!; p++) {
      const u = problem.targets[p]!
      if (isAffected[u] === affectedNow || this.slotOf[u]! < 0) continue
      isAffected[u] = affectedNow
      affected[count++] = u
    }
    return count
  }

  private exchange(s: number, t: number): void {
    const { variableAt, slotOf } = this
    const [a, b] = [variableAt[s]!, variableAt[t]!]
    variableAt[s] = b
    variableAt[t] = a
    if (a >= 0) slotOf[a] = t
    if (b >= 0) slotOf[b] = s
  }

  /** Exchanges what two slots of one group hold, if the change is accepted. */
  private move(s: number, t: number, temperature: number): void {
    const { variableAt, costOf, affected, saved } = this
    this.affectedNow++
    const count = this.affect(variableAt[t]!, this.affect(variableAt[s]!, 0))
    this.exchange(s, t)
    let change = 0
    for (let k = 0; k < count; k++) {
      const i = affected[k]!
      saved[k] = costOf[i]!
      costOf[i] = this.evaluate(i)
      change += costOf[i]! - saved[k]!
    }
    if (change <= 0 || this.below(1 << 24) < Math.exp(-change / temperature) * (1 << 24)) return
    this.exchange(s, t)
    for (let k = 0; k < count; k++) costOf[affected[k]!] = saved[k]!
  }

  /** Steps that one move takes on average, roughly: all partners of all affected variables. */
  private workPerMove(): number {
    const degree = this.problem.targets.length / Math.max(1, this.problem.order)
    return 2 * (degree + 1) * (degree + 1)
  }

  /** Runs the whole schedule; ends early when the watch says so. */
  run(watch: Watch): void {
    const { slotOf, problem, template } = this
    if (problem.order < 1 || template.slots < 2) return
    const moves = Math.min(DEFAULTS.movesPerVariable * problem.order, DEFAULTS.mostWork / this.workPerMove())
    const rounds = Math.ceil(moves / MOVES_PER_LOOK)
    for (let round = 0; round < rounds; round++) {
      if (watch.shouldStop(0)) return
      const progress = round / Math.max(1, rounds - 1)
      const temperature = DEFAULTS.hot * (DEFAULTS.cold / DEFAULTS.hot) ** progress
      // Variables go anywhere at first and to slots nearby at last.
      const radius = Math.max(2, Math.round(template.slots * (1 - progress)))
      for (let m = 0; m < MOVES_PER_LOOK; m++) {
        const s = slotOf[this.below(problem.order)]!
        if (s < 0) continue
        const t = s + 1 + this.below(2 * radius) - radius
        if (t < 0 || t >= template.slots || t === s || template.groupOf[s] !== template.groupOf[t]) continue
        this.move(s, t, temperature)
      }
    }
  }
}
