import { degreeOf } from '../../graph/graph'
import type { Graph } from '../../graph/graph'
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
  variables: 30,
  /** Interactions of one of them that are looked at, and unmet ones. */
  interactions: 60,
}

/** A chain as it shrinks. */
interface ShrinkingChain {
  /** Qubits left, each with the interacting variables that it touches. */
  readonly touched: Map<number, Set<number>>
  /** Qubits that touch each interacting variable. */
  readonly contacts: Map<number, number>
}

function contactsOf(touched: ReadonlyMap<number, ReadonlySet<number>>): Map<number, number> {
  const contacts = new Map<number, number>()
  for (const others of touched.values()) for (const u of others) contacts.set(u, (contacts.get(u) ?? 0) + 1)
  return contacts
}

/** The chains of a state while interactions are dropped; only those that were looked at are worked out. */
class ShrinkingChains {
  private readonly uses: Uint32Array
  private readonly owners: ReturnType<typeof ownersOf>
  private readonly chains = new Map<number, ShrinkingChain>()
  private readonly unmet: Set<number>

  constructor(
    private readonly task: EmbeddingTask,
    private readonly partial: PartialEmbedding,
  ) {
    this.uses = usesOf(partial.chains, task.machine.order)
    this.owners = ownersOf(partial.chains, task.machine.order)
    this.unmet = new Set(partial.unmet)
  }

  /** Conflicts that would go with the interaction; the chains stay as they are. */
  relief(edge: number): number {
    const { ends } = this.task.problem
    const [a, b] = [ends[2 * edge]!, ends[2 * edge + 1]!]
    const given = [...this.superfluous(a, b), ...this.superfluous(b, a)]
    let conflicts = this.unmet.has(edge) ? 1 : 0
    for (const q of given) if (this.uses[q]!-- > 1) conflicts++
    for (const q of given) this.uses[q]!++
    return conflicts
  }

  /** Cuts the chains of the interaction's variables back to what the others need. */
  drop(edge: number): void {
    const { ends } = this.task.problem
    const [a, b] = [ends[2 * edge]!, ends[2 * edge + 1]!]
    for (const [variable, other] of [
      [a, b],
      [b, a],
    ] as const) {
      const { touched } = this.chain(variable)
      for (const q of this.superfluous(variable, other)) {
        touched.delete(q)
        this.uses[q]!--
      }
      for (const others of touched.values()) others.delete(other)
      this.chains.set(variable, { touched, contacts: contactsOf(touched) })
    }
  }

  private chain(variable: number): ShrinkingChain {
    let chain = this.chains.get(variable)
    if (!chain) {
      const touched = touchedBy(this.task, variable, chainOf(this.partial.chains, variable), this.owners)
      chain = { touched, contacts: contactsOf(touched) }
      this.chains.set(variable, chain)
    }
    return chain
  }

  /** Qubits that the chain could give up from its ends inwards if it need not touch `other`. */
  private superfluous(variable: number, other: number): number[] {
    const chain = this.chain(variable)
    const left = new Map(chain.touched)
    const lost = new Map<number, number>()
    const waiting = [...left.keys()]
    const given: number[] = []
    const isLast = (u: number): boolean => u !== other && chain.contacts.get(u)! - (lost.get(u) ?? 0) === 1
    for (let q = waiting.pop(); q !== undefined; q = waiting.pop()) {
      const others = left.get(q)
      if (!others || left.size === 1) continue
      const inside = this.besideIn(left, q)
      if (inside.length > 1 || [...others].some(isLast)) continue
      left.delete(q)
      given.push(q)
      for (const u of others) lost.set(u, (lost.get(u) ?? 0) + 1)
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

function shareVariable({ ends }: Graph, edge: number, other: number): boolean {
  const [a, b] = [ends[2 * other]!, ends[2 * other + 1]!]
  return [ends[2 * edge], ends[2 * edge + 1]].some((v) => v === a || v === b)
}

/**
 * The few interactions whose loss would take most conflicts out of the closest state, one after the other: each is
 * judged with those before it gone, and its two chains cut back to what their other interactions need. An estimate: a
 * search without them starts afresh.
 * @returns at most `most`, only such as relieve something
 */
export function interactionsToDrop(task: EmbeddingTask, partial: PartialEmbedding, most: number): InteractionRelief[] {
  const chains = new ShrinkingChains(task, partial)
  let waiting = candidates(task, partial).map((edge) => ({ edge, conflicts: chains.relief(edge) }))
  const ranked: InteractionRelief[] = []
  while (ranked.length < most) {
    let best = { edge: -1, conflicts: 0 }
    for (const candidate of waiting) if (candidate.conflicts > best.conflicts) best = candidate
    if (best.edge < 0) break
    // What was dropped meanwhile may have left less to relieve.
    const conflicts = chains.relief(best.edge)
    if (conflicts < best.conflicts) {
      best.conflicts = conflicts
      continue
    }
    chains.drop(best.edge)
    ranked.push({ edge: best.edge, conflicts })
    waiting = waiting.filter((candidate) => candidate !== best)
    for (const candidate of waiting)
      if (shareVariable(task.problem, best.edge, candidate.edge)) candidate.conflicts = chains.relief(candidate.edge)
  }
  return ranked
}
