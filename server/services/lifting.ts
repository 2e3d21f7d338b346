import { DomainError } from '../../shared/errors'
import type { LiftedStates } from '../../shared/schemas/presolve'
import type { Actor, App } from '../app'
import type { ProblemRow } from '../database/repositories/problems'
import { findReferredProblem } from '../database/repositories/problems'
import { findReduction } from '../database/repositories/reductions'
import type { ProblemData } from './problem-data'
import { packStates, problemData, problemRow } from './problems'
import type { ReductionRecord } from './reduction-record'
import { coefficientsOf, unpackRecord } from './reduction-record'
import { signed, signOf } from './sense'

type LiftRequest = Parameters<typeof packStates>[0]

/** How answers to this version of a problem are lifted; null where it was not reduced from another one. */
export async function liftingOf(app: App, row: ProblemRow, data?: ProblemData): Promise<ReductionRecord | null> {
  const reduction = await findReduction(app.db, row.id)
  if (!reduction) return null
  const record = unpackRecord(await app.blobs.read(reduction.blobId))
  // A later version with other coefficients is another problem.
  return record.coefficients === coefficientsOf(data ?? (await problemData(app, row))) ? record : null
}

/** States lifted to the first problem, one after the other, and their energies there in its own sense. */
export async function liftPacked(
  app: App,
  record: ReductionRecord,
  states: Int8Array,
  count: number,
  form: 'qubo' | 'ising',
): Promise<{ states: Int8Array; energies: number[] | null }> {
  const levels = record.levels.map(({ variables, kept, steps }) => ({ form, variables, kept, steps }))
  const lifted = await app.compute.run('liftStates', { levels, states, count })
  const { source, sense } = record.levels[record.levels.length - 1]!
  // Also while its deletion can be undone.
  const original = await findReferredProblem(app.db, source.id, source.version)
  if (!original) return { states: lifted, energies: null }
  const { problem, form: from } = await problemData(app, original)
  const energies = await app.compute.run('energies', { problem, from, form, states: lifted })
  return { states: lifted, energies: Array.from(energies, (energy) => signed(signOf(sense), energy)) }
}

/** Values in one answer: each takes some bytes on the way out. */
const MAX_VALUES = 20_000_000

/** States of a reduced problem as states of the problem that it came from first. */
export async function liftStates(app: App, actor: Actor, id: string, request: LiftRequest): Promise<LiftedStates> {
  const row = await problemRow(app, actor, id)
  const record = await liftingOf(app, row)
  if (!record)
    throw new DomainError(
      'wrong state',
      'lift.none',
      `P-${row.number} at version ${row.version} is not what a pre-solve left of another problem: its states need no lifting.`,
    )
  const { labels, variables, source } = record.levels[record.levels.length - 1]!
  const most = Math.max(1, Math.floor(MAX_VALUES / variables))
  if (request.states.length > most)
    throw new DomainError('too large', 'lift.states', `Send at most ${most} states of this problem at a time.`)
  const packed = packStates(request, row.variables)
  const { states, energies } = await liftPacked(app, record, packed, request.states.length, request.form)
  return {
    problem: source,
    form: request.form,
    labels: [...labels],
    states: request.states.map((_, k) => Array.from(states.subarray(k * variables, (k + 1) * variables))),
    energies,
    through: record.levels.map((level) => level.source),
  }
}
