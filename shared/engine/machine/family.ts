import { groupDigits } from '../digits'
import type { Family } from './fabric'
import type { FamilySize } from './families/rules'
import { rulesOf } from './families/registry'

/** The largest machine graph that is built: 2¹⁷ qubits let a king's graph of 320 by 320 through. */
export const FAMILY_LIMITS = { qubits: 131_072, couplers: 1_000_000 } as const

function sizeProblem(value: unknown, { field, least }: FamilySize): string | null {
  if (typeof value === 'number' && Number.isInteger(value) && value >= least) return null
  return `${field} must be a whole number of at least ${least}, not ${String(value)}`
}

function limitProblem(family: Family, count: number, limit: number, what: string): string | null {
  if (count <= limit) return null
  const size = Number.isSafeInteger(count) ? groupDigits(count) : 'far too many'
  return `${familyName(family)} would have ${size} ${what}; at most ${groupDigits(limit)} are possible`
}

/**
 * What is wrong with a family's sizes, as sentences for the person who entered them; empty when it can be built.
 * Size limits are checked in closed form, before anything is allocated.
 */
export function familyProblems(family: Family): string[] {
  const values = new Map<string, unknown>(Object.entries(family))
  const wrongSizes = rulesOf(family).sizes.map((size) => sizeProblem(values.get(size.field), size))
  const problems = wrongSizes.filter((problem) => problem !== null)
  if (problems.length > 0) return problems
  return [
    limitProblem(family, qubitCount(family), FAMILY_LIMITS.qubits, 'qubits'),
    limitProblem(family, couplerCount(family), FAMILY_LIMITS.couplers, 'couplers'),
  ].filter((problem) => problem !== null)
}

/** Qubits of the family graph before defects, in closed form. */
export const qubitCount = (family: Family): number => rulesOf(family).qubitCount(family)

/** Couplers of the family graph before defects, in closed form. */
export const couplerCount = (family: Family): number => rulesOf(family).couplerCount(family)

/** Short name with sizes, such as `P(16)`, `C(16,16,4)` or `square grid 20×30`. */
export const familyName = (family: Family): string => rulesOf(family).name(family)
