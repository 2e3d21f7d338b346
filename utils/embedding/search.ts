import type { CreateEmbedding, EmbeddingMethod, EmbeddingView, Objective, StartWork } from '#shared/schemas/embeddings'
import type { MachineItem } from '#shared/schemas/machines'
import type { MethodChoice } from './methods'
import { formatCount, formatNumber } from '../format'

/** What the form starts with: enough for most problems of some hundred variables. */
export const SEARCH_START = { tries: 8, timeLimitSeconds: 30 } as const

export const SEARCH_BOUNDS = {
  seed: { least: 0, most: Number.MAX_SAFE_INTEGER },
  tries: { least: 1, most: 1000 },
  timeLimitSeconds: { least: 0.1, most: 3600 },
  target: { least: 1, most: Number.MAX_SAFE_INTEGER },
} as const

/** What is asked of a search besides problem and machine. */
export type SearchSettings = Pick<CreateEmbedding, 'seed' | 'tries' | 'timeLimitSeconds' | 'objective' | 'target'> & {
  method: MethodChoice
}

/** What is asked of an embedding made from another. */
export interface StartSettings {
  problemId: string
  work: StartWork
  /** Labels of the variables whose chains must stay as they are. */
  frozen: string[]
  timeLimitSeconds: number
}

/** A seed that none of these embeddings used. */
export const freshSeed = (embeddings: readonly { seed: number }[]): number =>
  1 + Math.max(0, ...embeddings.map(({ seed }) => seed).filter((seed) => seed < SEARCH_BOUNDS.seed.most))

/** The form as it is typed: null where a field is empty, NaN where it holds no number. */
export interface SearchDraft {
  method: MethodChoice
  seed: number | null
  tries: number | null
  timeLimitSeconds: number | null
  objective: Objective
  longestChain: number | null
  totalQubits: number | null
}

export const startDraft = (seed: number): SearchDraft => ({
  method: 'auto',
  seed,
  ...SEARCH_START,
  objective: 'longest chain',
  longestChain: null,
  totalQubits: null,
})

/** Why a machine is certainly too small, or null where nothing rules it out by its counts. */
export function tooSmall(
  problem: { variables: number; interactions: number },
  machine: Pick<MachineItem, 'qubits' | 'couplers'>,
): string | null {
  const { variables, interactions } = problem
  if (variables > machine.qubits)
    return `${formatNumber(variables - machine.qubits)} qubits too few for ${formatNumber(variables)} variables`
  if (interactions > machine.couplers)
    return `${formatNumber(interactions - machine.couplers)} couplers too few for ${formatNumber(interactions)} interactions`
  return null
}

/** What is wrong with a number of the search, or undefined. */
export function numberProblem(
  label: string,
  value: number | null,
  { least, most }: { least: number; most: number },
  isWhole: boolean,
): string | undefined {
  if (value === null || Number.isNaN(value)) return `${label} is not given as a number.`
  if (isWhole && !Number.isInteger(value)) return `${label} is a whole number.`
  if (value < least || value > most) return `${label} lies from ${formatNumber(least)} to ${formatNumber(most)}.`
  return undefined
}

/** A target may be left empty; what is given is a whole number from 1. */
const targetProblem = (label: string, value: number | null): string | undefined =>
  value === null || (Number.isInteger(value) && value >= SEARCH_BOUNDS.target.least)
    ? undefined
    : `${label} is a whole number from 1, or nothing.`

/** What is wrong with each field that is not simply chosen. */
export function draftProblems(draft: SearchDraft) {
  return {
    seed: numberProblem('The seed', draft.seed, SEARCH_BOUNDS.seed, true),
    tries: numberProblem('The number of tries', draft.tries, SEARCH_BOUNDS.tries, true),
    timeLimitSeconds: numberProblem('The time limit', draft.timeLimitSeconds, SEARCH_BOUNDS.timeLimitSeconds, false),
    longestChain: targetProblem('The longest chain to stop at', draft.longestChain),
    totalQubits: targetProblem('The number of qubits to stop at', draft.totalQubits),
  }
}

/** The settings of a draft without problems. */
export const settingsOf = (draft: SearchDraft): SearchSettings => ({
  method: draft.method,
  seed: draft.seed!,
  tries: draft.tries!,
  timeLimitSeconds: draft.timeLimitSeconds!,
  objective: draft.objective,
  target: { longestChain: draft.longestChain ?? undefined, totalQubits: draft.totalQubits ?? undefined },
})

const isGiven = (value: number | null): value is number => value !== null && !Number.isNaN(value)

/** What is set under "More settings", in one line. */
export function draftSummary({ seed, tries, objective, longestChain, totalQubits }: SearchDraft): string {
  const stops = [
    isGiven(longestChain) && `a longest chain of ${formatNumber(longestChain)}`,
    isGiven(totalQubits) && `${formatCount(totalQubits, 'qubit')} in all`,
  ].filter(Boolean)
  return [
    isGiven(seed) ? `seed ${seed}` : 'no seed',
    isGiven(tries) ? formatCount(tries, 'try', 'tries') : 'no tries',
    objective === 'longest chain' ? 'longest chain minimised first' : 'total of qubits minimised first',
    stops.length ? `stops at ${stops.join(' and ')}` : 'no early stop',
  ].join(', ')
}

/** `8 tries`; with `auto`, `8 tries of each method`. */
export const triesText = ({ method, tries }: { method: EmbeddingMethod; tries: number }): string =>
  formatCount(tries, 'try', 'tries') + (method === 'auto' ? ' of each method' : '')

/** What an embedding was asked for with, to ask for it again. */
function askedFor({ method, seed, tries, timeLimitSeconds, objective, target }: EmbeddingView) {
  const isMethod = method === 'auto' || method === 'search' || method === 'lines' || method === 'template'
  return {
    method: isMethod ? method : ('auto' as const),
    seed,
    tries,
    timeLimitSeconds,
    objective,
    target: { longestChain: target.longestChain ?? undefined, totalQubits: target.totalQubits ?? undefined },
  }
}

/** The next search: the same one after it was stopped or failed, else another seed with twice the tries and time. */
export function nextSearch(embedding: EmbeddingView): SearchSettings {
  const asked = askedFor(embedding)
  if (embedding.status !== 'none found') return asked
  return {
    ...asked,
    seed: asked.seed < SEARCH_BOUNDS.seed.most ? asked.seed + 1 : 0,
    tries: Math.min(SEARCH_BOUNDS.tries.most, 2 * asked.tries),
    timeLimitSeconds: Math.min(SEARCH_BOUNDS.timeLimitSeconds.most, 2 * asked.timeLimitSeconds),
  }
}
