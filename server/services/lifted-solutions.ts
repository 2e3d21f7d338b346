import type { LiftedSolution, LiftedTo } from '../../shared/schemas/returns'
import type { App } from '../app'
import { findProblem } from '../database/repositories/problems'
import type { DistinctState } from '../workers/tasks/list-solutions'
import { liftingOf, liftPacked } from './lifting'
import type { Bench } from './programming'
import { signed, signOf } from './sense'

/** Energies that differ by no more than the rounding of sums count as equal. */
const isSame = (a: number, b: number): boolean => Math.abs(a - b) <= 1e-9 * Math.max(1, Math.abs(a), Math.abs(b))

/** Decoded answers to a reduced problem as answers to the one it came from; null where there is no such problem. */
export async function liftedSolutions(
  app: App,
  { problem, labels }: Bench,
  solutions: readonly DistinctState[],
): Promise<{ to: LiftedTo; rows: LiftedSolution[] } | null> {
  const record = await liftingOf(app, problem)
  if (!record) return null
  const packed = new Int8Array(solutions.length * labels.length)
  solutions.forEach(({ spins }, k) => packed.set(spins, k * labels.length))
  const { states, energies } = await liftPacked(app, record, packed, solutions.length, problem.form)
  const { source, variables, labels: originals } = record.levels[record.levels.length - 1]!
  const rows = solutions.map(({ energy }, k): LiftedSolution => {
    const lifted = energies?.[k] ?? null
    const state = states.subarray(k * variables, (k + 1) * variables)
    return {
      energy: lifted,
      isEqual: lifted === null ? null : isSame(lifted, signed(signOf(problem.sense), energy)),
      assignment: Object.fromEntries(originals.map((label, i) => [label, state[i]!])),
    }
  })
  const isThere = (await findProblem(app.db, problem.workspaceId, source.id)) !== undefined
  return { to: { ...source, variables, isThere }, rows }
}
