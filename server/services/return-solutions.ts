import { csvCell } from '../../shared/csv'
import { writeBytes } from '../../shared/engine/formats/npy-array'
import { DomainError } from '../../shared/errors'
import type { Decoding, LiftedSolution, SolutionRow, SolutionView } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import type { DistinctState, ListedSolutions } from '../workers/tasks/list-solutions'
import type { DecodedRows } from '../workers/tasks/summarise'
import { liftedSolutions } from './lifted-solutions'
import { loadReturn, readyRow } from './loaded-return'
import type { Bench } from './programming'
import { decodedBy } from './return-summary'
import { signed, signOf } from './sense'

/** Values by label in one answer of solutions: each takes some tens of bytes on the way out. */
const MAX_VALUES = 4_000_000

/** The best distinct states of a decoding, and how many reads break each confirmed group. */
export function listedSolutions(
  app: App,
  { problem }: Bench,
  { states, energies }: DecodedRows,
  { limit, feasibleOnly }: { limit: number; feasibleOnly: boolean },
): Promise<ListedSolutions> {
  return app.compute.run('listSolutions', { states, energies, groups: problem.groups ?? [], feasibleOnly, limit })
}

function solutionRows(
  { labels, problem }: Bench,
  solutions: readonly DistinctState[],
  lifted: readonly LiftedSolution[] | undefined,
): SolutionRow[] {
  const sign = signOf(problem.sense)
  return solutions.map(({ energy, count, distance, spins, violated }, k) => ({
    energy: signed(sign, energy),
    count,
    distance,
    violated: problem.groups?.length ? violated : null,
    assignment: Object.fromEntries(
      labels.map((label, i) => [label, problem.form === 'qubo' ? (spins[i]! + 1) / 2 : spins[i]!]),
    ),
    lifted: lifted?.[k] ?? null,
  }))
}

/** Solutions with the parts of their energies, in the Ising form. */
export function solutionViews(
  bench: Bench,
  solutions: readonly DistinctState[],
  lifted: readonly LiftedSolution[] | undefined,
): SolutionView[] {
  const { linear, rows, cols, values, offset } = bench.ising
  const sign = signOf(bench.problem.sense)
  return solutionRows(bench, solutions, lifted).map((row, k) => {
    const { spins } = solutions[k]!
    const fields = linear.reduce((sum, h, i) => sum + h * spins[i]!, 0)
    const interactions = values.reduce((sum, J, e) => sum + J * spins[rows[e]!]! * spins[cols[e]!]!, 0)
    const parts = {
      linear: signed(sign, fields),
      interactions: signed(sign, interactions),
      offset: signed(sign, offset),
    }
    return { ...row, parts }
  })
}

/** The best distinct decoded assignments. */
export async function solutionsOf(
  app: App,
  actor: Actor,
  id: string,
  asked: { decode: Decoding; limit: number; feasibleOnly: boolean },
): Promise<SolutionRow[]> {
  const row = await readyRow(app, actor, id)
  const { bench, summary } = await loadReturn(app, actor, row)
  const most = Math.max(1, Math.floor(MAX_VALUES / bench.ising.n))
  const { solutions, distinct } = await listedSolutions(app, bench, decodedBy(summary, asked.decode), asked)
  if (Math.min(distinct, asked.limit) > most)
    throw new DomainError('too large', 'solutions.size', `Ask for at most ${most} solutions of this problem (limit).`)
  const lifted = await liftedSolutions(app, bench, solutions)
  return solutionRows(bench, solutions, lifted?.rows)
}

/**
 * Assignments of the problem that this one was reduced from, in place of its own.
 * @throws DomainError when it was not reduced from another one
 */
export const inOriginal = (rows: readonly SolutionRow[]): SolutionRow[] =>
  rows.map((row) => {
    if (!row.lifted)
      throw new DomainError(
        'not acceptable',
        'solutions.lifted',
        'This problem is not what a pre-solve left of another one. Leave `lifted` out.',
      )
    return { ...row, energy: row.lifted.energy ?? row.energy, assignment: row.lifted.assignment }
  })

/** One row per assignment, a column for each variable, as a NumPy array of small integers. */
export function solutionsNpy(rows: readonly SolutionRow[]): Uint8Array {
  const labels = Object.keys(rows[0]?.assignment ?? {})
  return writeBytes(Int8Array.from(rows.flatMap(({ assignment }) => labels.map((label) => assignment[label]!))), [
    rows.length,
    labels.length,
  ])
}

/** One line per assignment: energy, count, distance, then a column for each variable. */
export function solutionsCsv(rows: readonly SolutionRow[]): string {
  const labels = Object.keys(rows[0]?.assignment ?? {})
  const head = ['energy', 'count', 'distance', ...labels.map(csvCell)].join(',')
  const lines = rows.map(({ energy, count, distance, assignment }) =>
    [energy, count, distance, ...labels.map((label) => assignment[label])].join(','),
  )
  return [head, ...lines, ''].join('\n')
}
