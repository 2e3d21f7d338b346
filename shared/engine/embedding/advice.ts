import { groupDigits, THIN_SPACE } from '../digits'
import { degreeOf } from '../graph/graph'
import { familyName } from '../machine/family'
import { treewidthLowerBound } from '../problem/treewidth-lower'
import { conflictsOf, variablesToLeaveOut } from './advice/conflicts'
import type { VariableConflict } from './advice/conflicts'
import { largerMachine } from './advice/larger-machine'
import type { LargerMachine } from './advice/larger-machine'
import { interactionsToDrop } from './advice/relief'
import type { InteractionRelief } from './advice/relief'
import type { PartialEmbedding } from './method'
import type { EmbeddingTask } from './task'

export type { InteractionRelief, LargerMachine, VariableConflict }

/** The qubits that the closest state asks for, against those there are. */
export interface RoomEstimate {
  /** Qubits of all chains, shared ones counted for each; variables without a chain count as the mean. */
  readonly needed: number
  readonly usable: number
  /** needed over usable. Below 1 the room would do, and the couplers are in the wrong places. */
  readonly ratio: number
  /** Qubits, and as a share of the variables, variables too many; 0 when the room would do. */
  readonly qubitsTooMany: number
  readonly variablesTooMany: number
}

/** Variables that fixing or elimination before the embedding could take out. */
export interface PresolveOutlook {
  readonly degreeAtMostOne: number
  readonly degreeTwo: number
  /** Variables that go when those with at most one interaction are taken out again and again. */
  readonly outsideCore: number
}

export type AdviceKind =
  'drop interactions' | 'leave out variables' | 'larger machine' | 'pre-solve' | 'more room' | 'another try'

/** One thing that may help, as a short sentence with what it is about. */
export interface AdviceItem {
  readonly kind: AdviceKind
  readonly message: string
  readonly variables: readonly number[]
  /** Edge numbers of the problem graph. */
  readonly interactions: readonly number[]
}

/** Where the closest state failed, and what may help. */
export interface EmbeddingAdvice {
  /** Variables with shared qubits or unmet interactions, most conflicts first. */
  readonly conflicts: readonly VariableConflict[]
  readonly overlappedQubits: readonly number[]
  /** At most ten, the one that relieves most first. */
  readonly drop: readonly InteractionRelief[]
  /** Without these the closest state would have no conflict left; null when they would be more than a few. */
  readonly leaveOut: readonly number[] | null
  readonly room: RoomEstimate
  /** Null for custom graphs, and where no size of the family would do. */
  readonly larger: LargerMachine | null
  readonly presolve: PresolveOutlook
  /** The same as sentences, the most promising first. */
  readonly items: readonly AdviceItem[]
}

const DEFAULTS = {
  drop: 10,
  leaveOut: 20,
  /** Room above this share counts as tight. */
  tight: 0.8,
  /** Pre-solving comes first where it could take out this share of the variables. */
  presolveShare: 0.1,
}

function roomOf({ problem, usable }: EmbeddingTask, { chains, unplaced }: PartialEmbedding): RoomEstimate {
  const placed = problem.order - unplaced
  const mean = placed > 0 ? chains.qubits.length / placed : 1
  const needed = Math.ceil(chains.qubits.length + unplaced * mean)
  const working = usable.reduce((sum, works) => sum + (works ? 1 : 0), 0)
  const ratio = working > 0 ? needed / working : Infinity
  return {
    needed,
    usable: working,
    ratio,
    qubitsTooMany: Math.max(0, needed - working),
    variablesTooMany: ratio > 1 ? Math.ceil(problem.order * (1 - 1 / ratio)) : 0,
  }
}

function presolveOf({ problem }: EmbeddingTask): PresolveOutlook {
  const degree = Uint32Array.from({ length: problem.order }, (_, v) => degreeOf(problem, v))
  let degreeAtMostOne = 0
  let degreeTwo = 0
  const waiting: number[] = []
  for (let v = 0; v < problem.order; v++) {
    if (degree[v] === 2) degreeTwo++
    if (degree[v]! > 1) continue
    degreeAtMostOne++
    waiting.push(v)
  }
  for (let i = 0; i < waiting.length; i++) {
    const v = waiting[i]!
    for (let p = problem.offsets[v]!; p < problem.offsets[v + 1]!; p++)
      if (--degree[problem.targets[p]!]! === 1) waiting.push(problem.targets[p]!)
  }
  return { degreeAtMostOne, degreeTwo, outsideCore: new Set(waiting).size }
}

const percent = (share: number): string => `${groupDigits(Math.round(100 * share))}${THIN_SPACE}%`
const counted = (count: number, one: string, many: string): string =>
  `${groupDigits(count)} ${count === 1 ? one : many}`

type Figures = Omit<EmbeddingAdvice, 'items'>

function smallerProblem({ drop, leaveOut }: Figures): AdviceItem[] {
  const items: AdviceItem[] = []
  if (leaveOut && leaveOut.length > 0) {
    const message = `Without ${counted(leaveOut.length, 'variable', 'variables')} the closest state would have no conflict left, so the rest of the problem may fit.`
    items.push({ kind: 'leave out variables', message, variables: leaveOut, interactions: [] })
  }
  if (drop.length > 0) {
    const conflicts = drop.reduce((sum, relief) => sum + relief.conflicts, 0)
    const message = `Dropping ${counted(drop.length, 'interaction', 'interactions')} may take ${counted(conflicts, 'conflict', 'conflicts')} out of the closest state (an estimate).`
    items.push({ kind: 'drop interactions', message, variables: [], interactions: drop.map(({ edge }) => edge) })
  }
  return items
}

function moreRoom({ room, larger }: Figures): AdviceItem | null {
  const asks = `The closest state asks for ${groupDigits(room.needed)} qubits, ${percent(room.ratio)} of the ${groupDigits(room.usable)} usable ones (an estimate)`
  if (larger) {
    const why =
      larger.limitedBy === 'treewidth'
        ? 'smaller ones fall short of a bound on treewidth'
        : `it would take up about ${percent(larger.share)} of it`
    const message = `${asks}; ${familyName(larger.family)} may do: ${why}.`
    return { kind: 'larger machine', message, variables: [], interactions: [] }
  }
  if (room.ratio < DEFAULTS.tight) return null
  return { kind: 'more room', message: `${asks}; a machine with more may do.`, variables: [], interactions: [] }
}

function presolving({ presolve }: Figures): AdviceItem | null {
  const { outsideCore, degreeTwo } = presolve
  if (outsideCore + degreeTwo === 0) return null
  const parts = [
    outsideCore > 0
      ? `${counted(outsideCore, 'variable hangs', 'variables hang')} on the rest by one interaction or none`
      : '',
    degreeTwo > 0 ? `${counted(degreeTwo, 'variable has', 'variables have')} two interactions` : '',
  ].filter(Boolean)
  const message = `Pre-solving may pay: ${parts.join(', ')}.`
  return { kind: 'pre-solve', message, variables: [], interactions: [] }
}

/** Room first where it is short; where it is not, another try may find the couplers. */
function itemsOf(figures: Figures, variables: number): AdviceItem[] {
  const { room, presolve } = figures
  const first: AdviceItem[] = []
  const last: AdviceItem[] = []
  const presolveItem = presolving(figures)
  const paying = presolve.outsideCore + presolve.degreeTwo >= DEFAULTS.presolveShare * variables
  if (presolveItem) (paying ? first : last).push(presolveItem)
  const roomItem = moreRoom(figures)
  const tight = room.ratio >= DEFAULTS.tight
  if (roomItem) (tight ? first : last).unshift(roomItem)
  if (!tight) {
    const message = 'There may be room enough: other tries or a longer limit may find an embedding.'
    first.unshift({ kind: 'another try', message, variables: [], interactions: [] })
  }
  return [...first, ...smallerProblem(figures), ...last]
}

/**
 * What stood in the way of an embedding and what may help, from the closest state of a search that found none. Every
 * figure is an estimate from that one state: nothing here says that an embedding exists, or that none does.
 */
export function adviseOn(task: EmbeddingTask, partial: PartialEmbedding): EmbeddingAdvice {
  const room = roomOf(task, partial)
  const larger = task.family
    ? largerMachine(task.family, room.needed, room.usable, treewidthLowerBound(task.problem))
    : null
  const figures: Figures = {
    conflicts: conflictsOf(task, partial),
    overlappedQubits: partial.overlappedQubits,
    drop: interactionsToDrop(task, partial, DEFAULTS.drop),
    leaveOut: variablesToLeaveOut(task, partial, DEFAULTS.leaveOut),
    room,
    larger,
    presolve: presolveOf(task),
  }
  return { ...figures, items: itemsOf(figures, task.problem.order) }
}
