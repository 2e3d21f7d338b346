import type { Random } from '../random'
import type { KernelChoice } from '../assembly'
import type { Embedding } from './embedding'
import type { Objective } from './objective'
import type { Watch } from './progress'
import type { EmbeddingTask } from './task'

/**
 * Ways to make an embedding. `search` places and reroutes chains, `lines` gives each variable a vertical and a
 * horizontal line of the machine, `template` cuts a complete-graph or complete bipartite construction to the problem.
 * `repair` and `shorten` begin from an embedding: the one changes as little as it can, the other makes chains shorter.
 */
export type Method = 'search' | 'lines' | 'template' | 'repair' | 'shorten'

/** The closest state when no embedding was found: the one with least overlap and fewest interactions without a coupler. */
export interface PartialEmbedding {
  /** Chains that may share qubits; empty for a variable that was not placed. */
  readonly chains: Embedding
  /** Σ over qubits of the chains beyond the first. */
  readonly overlap: number
  /** Qubits with more than one chain, ascending. */
  readonly overlappedQubits: readonly number[]
  /** Interactions without a coupler between their chains, as edge numbers of the problem graph, ascending. */
  readonly unmet: readonly number[]
  /** Variables without a qubit. */
  readonly unplaced: number
}

/** How far a state is from an embedding: overlap, interactions without a coupler, variables without a qubit. */
export const lacks = ({ overlap, unmet, unplaced }: PartialEmbedding): number => overlap + unmet.length + unplaced

/** What one try of a method is given besides the task. */
export interface Attempt {
  readonly random: Random
  /** What the best is chosen by. */
  readonly objective: Objective
  /** Time that falls to this try, in seconds: sets how much work goes into shortening, whatever the clock says. */
  readonly seconds: number
  /** What grows chains; both give the same. */
  readonly kernel: KernelChoice
  /** Asks for the end, and takes progress; to be asked at least every few milliseconds. */
  readonly watch: Watch
  /** Takes a valid embedding as soon as there is one, and each that may be better; keeps the best. */
  readonly offer: (embedding: Embedding) => void
}

/**
 * One try of a method. It offers every embedding it finds; same task and random numbers, same offers in the same order,
 * unless the watch ends it. Returns the closest state when it offered none, null when it has nothing to show.
 */
export type Runner = (task: EmbeddingTask, attempt: Attempt) => PartialEmbedding | null
