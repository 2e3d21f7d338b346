import { degreeOf } from '../../graph/graph'
import { chainOf } from '../embedding'
import type { PartialEmbedding } from '../method'
import type { EmbeddingTask } from '../task'
import { conflictsOf, ownersOf, touchedBy, usesOf } from './conflicts'

/** What dropping one interaction would take away from the closest state. */
export interface InteractionRelief {
  /** Edge number of the problem graph. */
  readonly edge: number
  /** Chains too many on qubits that the two chains could give up, and the interaction itself if it is unmet. */
  readonly conflicts: number
}

const DEFAULTS = {
  /** Variables whose interactions are looked at, those with most conflicts. */
  variables: 40,
  /** Interactions of one of them that are looked at. */
  interactions: 200,
}

/** Chains as they shrink while interactions are dropped; only those that were looked at are copied. */
class ShrinkingChains {
  private readonly uses: Uint32Array
  private readonly owners: ReturnType<typeof ownersOf>
  private readonly chains = new Map<number, Map<number, Set<number>>>()
  private readonly dropped = new Set<number>()
  private readonly unmet: Set<number>

  constructor(
    private readonly task: EmbeddingTask,
    private readonly partial: PartialEmbedding,
  ) {
    this.uses = usesOf(partial.chains, task.machine.order)
    this.owners = ownersOf(partial.chains, task.machine.order)
    this.unmet = new Set(partial.unmet)
  }

  isDropped(edge: number): boolean {
    return this.dropped.has(edge)
  }

  /** Conflicts that go when the interaction does; the chains stay as they are unless `drop` is set. */
  relief(edge: number, drop: boolean): number {
    const { ends } = this.task.problem
    const [a, b] = [ends[2 * edge]!, ends[2 * edge + 1]!]
    const given = [this.superfluous(a, b), this.superfluous(b, a)]
    let conflicts = this.unmet.has(edge) ? 1 : 0
    for (const qubits of given) for (const q of qubits) if (this.uses[q]!-- > 1) conflicts++
    if (drop) {
      this.dropped.add(edge)
      given.forEach((qubits, i) => qubits.forEach((q) => this.chain(i === 0 ? a : b).delete(q)))
      for (const others of this.chain(a).values()) others.delete(b)
      for (const others of this.chain(b).values()) others.delete(a)
    } else for (const qubits of given) for (const q of qubits) this.uses[q]!++
    return conflicts
  }

  /** Qubits of the variable's chain, each with the interacting variables it touches. */
  private chain(variable: number): Map<number, Set<number>> {
    let chain = this.chains.get(variable)
    if (!chain) {
      chain = touchedBy(this.task, variable, chainOf(this.partial.chains, variable), this.owners)
      this.chains.set(variable, chain)
    }
    return chain
  }

  /** Qubits that the chain could give up from its ends inwards if it need not touch `other`. */
  private superfluous(variable: number, other: number): number[] {
    const left = new Map(this.chain(variable))
    const contacts = new Map<number, number>()
    for (const others of left.values()) for (const u of others) contacts.set(u, (contacts.get(u) ?? 0) + 1)
    const waiting = [...left.keys()]
    const given: number[] = []
    for (let q = waiting.pop(); q !== undefined; q = waiting.pop()) {
      const others = left.get(q)
      if (!others || left.size === 1) continue
      const inside = this.besideIn(left, q)
      if (inside.length > 1 || [...others].some((u) => u !== other && contacts.get(u) === 1)) continue
      left.delete(q)
      given.push(q)
      for (const u of others) contacts.set(u, contacts.get(u)! - 1)
      waiting.push(...inside)
    }
    return given
  }

  private besideIn(chain: ReadonlyMap<number, unknown>, q: number): number[] {
    const { offsets, targets } = this.task.machine
    return [...targets.subarray(offsets[q], offsets[q + 1])].filter((beside) => chain.has(beside))
  }
}

/** Unmet interactions, and those of the variables with most conflicts. */
function candidates(task: EmbeddingTask, partial: PartialEmbedding): number[] {
  const { offsets, edgeIds } = task.problem
  const edges = new Set(partial.unmet.slice(0, DEFAULTS.interactions))
  for (const { variable } of conflictsOf(task, partial).slice(0, DEFAULTS.variables)) {
    const count = Math.min(degreeOf(task.problem, variable), DEFAULTS.interactions)
    for (let i = 0; i < count; i++) edges.add(edgeIds[offsets[variable]! + i]!)
  }
  return [...edges].sort((a, b) => a - b)
}

/**
 * The few interactions whose loss would take most conflicts out of the closest state, one after the other: each is
 * judged with those before it gone, and its two chains cut back to what their other interactions need. An estimate: a
 * search without them starts afresh.
 * @returns at most `most`, only such as relieve something
 */
export function interactionsToDrop(task: EmbeddingTask, partial: PartialEmbedding, most: number): InteractionRelief[] {
  const chains = new ShrinkingChains(task, partial)
  const edges = candidates(task, partial)
  const ranked: InteractionRelief[] = []
  while (ranked.length < most) {
    let best = -1
    let conflicts = 0
    for (const edge of edges) {
      if (chains.isDropped(edge)) continue
      const relief = chains.relief(edge, false)
      if (relief > conflicts) [best, conflicts] = [edge, relief]
    }
    if (best < 0) break
    chains.relief(best, true)
    ranked.push({ edge: best, conflicts })
  }
  return ranked
}
