import type { z } from 'zod'
import { convertForm } from '../../shared/engine/problem/convert'
import { DomainError } from '../../shared/errors'
import type { DeletionView } from '../../shared/schemas/deletions'
import type { editProblemSchema, energyRequestSchema, TermsView, termsQuerySchema } from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import type { ProblemRow } from '../database/repositories/problems'
import { findProblem, updateProblem } from '../database/repositories/problems'
import { deleteFor } from './deletions'
import type { ProblemData } from './problem-data'
import { unpackProblem } from './problem-data'
import { changeTags } from './problem-tags'
import { signed, signOf } from './sense'

/**
 * A problem of the workspace at one of its versions, without a number at the current one.
 * @throws DomainError not found, also for another workspace's
 */
export async function problemRow(
  app: App,
  actor: Pick<Actor, 'workspaceId'>,
  id: string,
  version?: number,
): Promise<ProblemRow> {
  const row = await findProblem(app.db, actor.workspaceId, id, version)
  if (!row && version !== undefined && (await findProblem(app.db, actor.workspaceId, id)))
    throw new DomainError('not found', 'problem.version', `This problem has no version ${version}.`)
  if (!row) throw new DomainError('not found', 'problem.unknown', 'There is no such problem in this workspace.')
  return row
}

export async function problemData(app: App, row: ProblemRow): Promise<ProblemData> {
  return unpackProblem(await app.blobs.read(row.dataBlobId))
}

export async function editProblem(
  app: App,
  actor: Actor,
  id: string,
  edit: z.infer<typeof editProblemSchema>,
): Promise<void> {
  await problemRow(app, actor, id)
  const { tags, ...rest } = edit
  await app.db.transaction(async (tx) => {
    if (tags) await changeTags(tx, actor.workspaceId, id, tags)
    // Tags are how a problem is filed, not what it is: it does not move in the order of last changes for them.
    if (Object.values(rest).some((value) => value !== undefined))
      await updateProblem(tx, id, { ...rest, changedAt: app.now() })
  })
}

/** Deletes a problem with its versions, embeddings, run sheets and samples. */
export async function removeProblem(app: App, actor: Actor, id: string): Promise<DeletionView> {
  await problemRow(app, actor, id)
  return deleteFor(app, 'problem', id)
}

/** Rows of both forms side by side, in the problem's own sense. */
export async function termsOf(
  app: App,
  actor: Actor,
  id: string,
  query: z.infer<typeof termsQuerySchema>,
): Promise<TermsView> {
  const row = await problemRow(app, actor, id, query.version)
  const { form, labels, problem } = await problemData(app, row)
  const qubo = convertForm(problem, form, 'qubo')
  const ising = convertForm(problem, form, 'ising')
  const sign = signOf(row.sense)
  const { part, start, limit } = query
  const total = part === 'linear' ? problem.n : problem.values.length
  const indices = Array.from({ length: Math.max(0, Math.min(limit, total - start)) }, (_, k) => start + k)
  return {
    part,
    start,
    total,
    linear:
      part === 'linear'
        ? indices.map((i) => ({
            label: labels[i]!,
            qubo: signed(sign, qubo.linear[i]!),
            ising: signed(sign, ising.linear[i]!),
          }))
        : [],
    interactions:
      part === 'interactions'
        ? indices.map((k) => ({
            places: [problem.rows[k]! + 1, problem.cols[k]! + 1],
            a: labels[problem.rows[k]!]!,
            b: labels[problem.cols[k]!]!,
            qubo: signed(sign, qubo.values[k]!),
            ising: signed(sign, ising.values[k]!),
          }))
        : [],
    offset: { qubo: signed(sign, qubo.offset), ising: signed(sign, ising.offset) },
  }
}

/** Terms summed in one request: some seconds of a thread. */
const MAX_TERMS = 1e9

type EnergyRequest = z.infer<typeof energyRequestSchema>

/** Energies of states in either alphabet, offset included, in the problem's own sense. */
export async function energiesOf(
  app: App,
  actor: Actor,
  id: string,
  request: EnergyRequest,
  version?: number,
): Promise<number[]> {
  const row = await problemRow(app, actor, id, version)
  const most = Math.max(1, Math.floor(MAX_TERMS / (row.variables + row.interactions)))
  if (request.states.length > most)
    throw new DomainError('too large', 'energy.states', `Send at most ${most} states of this problem at a time.`)
  const states = packStates(request, row.variables)
  const { form: from, problem } = await problemData(app, row)
  const energies = await app.compute.run('energies', { problem, from, form: request.form, states })
  const sign = signOf(row.sense)
  return Array.from(energies, (energy) => signed(sign, energy))
}

/** The states one after the other. @throws DomainError naming the first state and place that do not fit */
export function packStates({ form, states }: EnergyRequest, variables: number): Int8Array {
  const [low, high] = form === 'qubo' ? [0, 1] : [-1, 1]
  const packed = new Int8Array(states.length * variables)
  states.forEach((state, k) => {
    if (state.length !== variables)
      throw new DomainError(
        'not acceptable',
        'energy.length',
        `State ${k} has ${state.length} values; the problem has ${variables} variables.`,
      )
    const bad = state.findIndex((value) => value !== low && value !== high)
    if (bad >= 0)
      throw new DomainError(
        'not acceptable',
        'energy.value',
        `State ${k} has the value ${state[bad]} at place ${bad}; a ${form} state holds ${low} and ${high}.`,
      )
    packed.set(state, k * variables)
  })
  return packed
}
