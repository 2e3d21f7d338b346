import { groupDigits } from '../digits'
import type { CustomGraph, Family, PublishedFamily } from './fabric'
import type { FamilyFigures, FamilySize } from './families/rules'
import { rulesOf } from './families/registry'

/** The largest machine graph that is built: 2¹⁷ qubits let a king's graph of 320 by 320 through. */
export const FAMILY_LIMITS = { qubits: 131_072, couplers: 1_000_000 } as const

function sizeProblem(value: unknown, { field, least }: FamilySize): string | null {
  if (typeof value === 'number' && Number.isInteger(value) && value >= least) return null
  return `${field} must be a whole number of at least ${least}, not ${String(value)}`
}

function limitProblem(family: PublishedFamily, count: number, limit: number, what: string): string | null {
  if (count <= limit) return null
  const size = Number.isSafeInteger(count) ? groupDigits(count) : 'far too many'
  return `${familyName(family)} would have ${size} ${what}; at most ${groupDigits(limit)} are possible`
}

/**
 * What is wrong with a family's sizes, as sentences for the person who entered them; empty when it can be built.
 * Size limits are checked in closed form, before anything is allocated.
 */
export function familyProblems(family: PublishedFamily): string[] {
  const values = new Map<string, unknown>(Object.entries(family))
  const wrongSizes = rulesOf(family).sizes.map((size) => sizeProblem(values.get(size.field), size))
  const problems = wrongSizes.filter((problem) => problem !== null)
  if (problems.length > 0) return problems
  return [
    limitProblem(family, qubitCount(family), FAMILY_LIMITS.qubits, 'qubits'),
    limitProblem(family, couplerCount(family), FAMILY_LIMITS.couplers, 'couplers'),
  ].filter((problem) => problem !== null)
}

/** A graph of no family says itself how large it is. */
const CUSTOM: FamilyFigures<CustomGraph> = {
  name: ({ qubits }) => `graph of ${groupDigits(qubits)} ${qubits === 1 ? 'qubit' : 'qubits'}`,
  qubitCount: ({ qubits }) => qubits,
  couplerCount: ({ couplers }) => couplers,
}

/** Qubits of the machine graph before defects, in closed form. */
export const qubitCount = (family: Family): number =>
  family.kind === 'custom' ? CUSTOM.qubitCount(family) : rulesOf(family).qubitCount(family)

/** Couplers of the machine graph before defects, in closed form. */
export const couplerCount = (family: Family): number =>
  family.kind === 'custom' ? CUSTOM.couplerCount(family) : rulesOf(family).couplerCount(family)

/** Short name with sizes, such as `P(16)`, `C(16,16,4)`, `square grid 20×30` or `graph of 812 qubits`. */
export const familyName = (family: Family): string =>
  family.kind === 'custom' ? CUSTOM.name(family) : rulesOf(family).name(family)
