import type { MachineItem } from '#shared/schemas/machines'
import { formatNumber } from '../format'

/** What the form starts with: enough for most problems of some hundred variables. */
export const SEARCH_START = { tries: 8, timeLimitSeconds: 30 } as const

export const SEARCH_BOUNDS = {
  seed: { least: 0, most: Number.MAX_SAFE_INTEGER },
  tries: { least: 1, most: 1000 },
  timeLimitSeconds: { least: 0.1, most: 3600 },
} as const

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

/** The next search after one that found none: another seed, twice the tries and time, within the bounds. */
export function nextSearch({
  seed,
  tries,
  timeLimitSeconds,
}: {
  seed: number
  tries: number
  timeLimitSeconds: number
}) {
  return {
    seed: seed < SEARCH_BOUNDS.seed.most ? seed + 1 : 0,
    tries: Math.min(SEARCH_BOUNDS.tries.most, 2 * tries),
    timeLimitSeconds: Math.min(SEARCH_BOUNDS.timeLimitSeconds.most, 2 * timeLimitSeconds),
  }
}
