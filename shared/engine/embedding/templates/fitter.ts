import { graphFromEdges } from '../../graph/build'
import type { Graph } from '../../graph/graph'
import { degreeOf } from '../../graph/graph'
import { packChains } from '../embedding'
import type { Embedding } from '../embedding'
import type { Attempt } from '../method'
import { compareQuality, qualityOf } from '../objective'
import type { EmbeddingTask } from '../task'
import { ChainSet, FREE } from './chain-set'
import { Displacer } from './displace'
import { ExtraGrower } from './extra-chain'
import { Joiner } from './join'
import { layChains } from './lay'
import { SlotAnnealer } from './slot-annealing'
import type { Template } from './template'
import { thinChains } from './thin'

const DEFAULTS = {
  /** A template that leaves more unmet interactions a variable than this is not worth mending. */
  mostUnmet: 4,
  /** Nor one after whose mending more interactions a variable are blocked. */
  mostBlocked: 0.15,
}

/** The problem without its isolated variables, and which variables those of the core are. */
interface Core {
  readonly graph: Graph
  readonly variables: Int32Array
}

function coreOf(problem: Graph): Core {
  const variables = Int32Array.from({ length: problem.order }, (_, i) => i).filter((i) => degreeOf(problem, i) > 0)
  const indexOf = new Int32Array(problem.order)
  variables.forEach((i, k) => (indexOf[i] = k))
  return {
    graph: graphFromEdges(
      variables.length,
      problem.ends.map((i) => indexOf[i]!),
    ),
    variables,
  }
}

/** Fits the problem of a task into templates of its machine, and offers what becomes valid. */
export class Fitter {
  /** The problem without isolated variables, which need no place in a template. */
  readonly core: Graph
  readonly isComplete: boolean
  /** The best that was offered. */
  best: Embedding | null = null
  private readonly variables: Int32Array
  private readonly set: ChainSet
  private readonly joiner: Joiner
  private readonly displacer: Displacer
  private readonly grower: ExtraGrower

  constructor(
    readonly task: EmbeddingTask,
    readonly attempt: Attempt,
  ) {
    const { graph, variables } = coreOf(task.problem)
    this.core = graph
    this.variables = variables
    this.isComplete = graph.ends.length === graph.order * (graph.order - 1)
    this.set = new ChainSet(graph, task.machine, task.usable)
    this.joiner = new Joiner(this.set)
    this.displacer = new Displacer(this.set, this.joiner)
    this.grower = new ExtraGrower(this.set)
  }

  /** Offers the chains there are, with a free qubit for each isolated variable; false when those do not suffice. */
  offer(): boolean {
    const { set, variables, task } = this
    const chains: number[][] = Array.from({ length: task.problem.order }, () => [])
    variables.forEach((i, k) => (chains[i] = set.chains[k]!))
    let q = 0
    for (const chain of chains) {
      if (chain.length > 0) continue
      while (q < set.owner.length && set.owner[q] !== FREE) q++
      if (q === set.owner.length) return false
      chain.push(q++)
    }
    const made = packChains(chains)
    const { objective, offer } = this.attempt
    if (!this.best || compareQuality(qualityOf(made), qualityOf(this.best), objective) < 0) this.best = made
    offer(made)
    return true
  }

  /** Puts variables with few partners last, so that they are the ones that get no slot when there are too few. */
  private firstSlots(slots: number): Int32Array {
    const { core } = this
    const order = Array.from({ length: core.order }, (_, i) => i)
    if (!this.isComplete) order.sort((a, b) => degreeOf(core, b) - degreeOf(core, a) || a - b)
    const slotOf = new Int32Array(core.order).fill(-1)
    order.slice(0, slots).forEach((i, slot) => (slotOf[i] = slot))
    return slotOf
  }

  /**
   * Lays the problem along a template with one group of slots, grows chains for variables beyond its slots, mends what
   * is missing and offers the result. Returns whether it was valid.
   */
  fit(template: Template): boolean {
    return this.fitFrom(template, this.firstSlots(template.slots))
  }

  /** The same from a first choice of slots, −1 for variables without one. */
  fitFrom(template: Template, firstSlotOf: Int32Array): boolean {
    const { watch, random } = this.attempt
    watch.phase = 'fitting the template'
    const annealer = new SlotAnnealer(this.core, template, firstSlotOf, random)
    if (!this.isComplete) annealer.run(watch)
    if (watch.shouldStop(0)) return false
    this.set.clear()
    layChains(this.set, template, annealer.slotOf)
    watch.phase = 'repairing'
    return this.mend() && this.offer()
  }

  /** Connects and joins what is laid. */
  private mend(): boolean {
    const { set, joiner, core } = this
    const { random, watch } = this.attempt
    if (set.unmet().length > DEFAULTS.mostUnmet * core.order && set.chains.every((chain) => chain.length > 0))
      return false
    for (let i = 0; i < core.order; i++) joiner.connect(i)
    thinChains(set)
    for (let i = 0; i < core.order; i++) if (set.chains[i]!.length === 0) this.grower.grow(i, random)
    if (set.chains.some((chain) => chain.length === 0)) return false
    const left = joiner.joinAll(random)
    if (left > DEFAULTS.mostBlocked * core.order) return false
    if (left > 0 && this.displacer.run(random, watch) > 0) return false
    thinChains(set)
    return true
  }
}
