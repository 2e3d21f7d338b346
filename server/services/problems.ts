import type { z } from 'zod'
import { convertForm } from '../../shared/engine/problem/convert'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { DeletionView } from '../../shared/schemas/deletions'
import type {
  editProblemSchema,
  energyRequestSchema,
  ProblemItem,
  ProblemView,
  TermsView,
  termsQuerySchema,
} from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import { embeddingsOfProblems } from '../database/repositories/embeddings'
import { pageOf, positionOf } from '../database/repositories/pages'
import type { ProblemRow } from '../database/repositories/problems'
import { findProblem, listProblems, personOf, updateProblem } from '../database/repositories/problems'
import { returnsOfRunSheets, runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { statsView } from './embedding-stats'
import { deleteFor } from './deletions'
import type { ProblemData } from './problem-data'
import { unpackProblem } from './problem-data'
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

/** Problems, newest change first, each with its newest embedding and run sheet. */
export async function problemsOf(app: App, actor: Actor, query: PageQuery): Promise<Page<ProblemItem>> {
  const position = positionOf(query.cursor)
  const rows = await listProblems(app.db, actor.workspaceId, query.limit + 1, position)
  const context = await contextOf(
    app,
    rows.map((row) => row.id),
  )
  return pageOf(
    rows.map((row) => itemOf(row, context)),
    query.limit,
    position,
  )
}

type Context = Awaited<ReturnType<typeof contextOf>>

/** What was built on several problems, fetched together. */
async function contextOf(app: App, problemIds: string[]) {
  const embeddings = await embeddingsOfProblems(app.db, problemIds)
  const sheets = await runSheetsOfEmbeddings(
    app.db,
    embeddings.map(({ embedding }) => embedding.id),
  )
  const returned = await returnsOfRunSheets(
    app.db,
    sheets.map((sheet) => sheet.id),
  )
  return { embeddings, sheets, returned }
}

function itemOf(row: ProblemRow, { embeddings, sheets, returned }: Context): ProblemItem {
  const own = embeddings.filter(({ embedding }) => embedding.problemId === row.id)
  // A later search that found nothing does not hide an embedding that was found.
  const shown =
    own.find(({ embedding }) => embedding.chosen) ?? own.find(({ embedding }) => embedding.status === 'found') ?? own[0]
  const ownSheets = sheets.filter((sheet) => own.some(({ embedding }) => embedding.id === sheet.embeddingId))
  const sheet = ownSheets[0]
  const sign = signOf(row.sense)
  const energies = returned
    .filter((entry) => entry.best !== null && ownSheets.some(({ id }) => id === entry.runSheetId))
    .map((entry) => sign * entry.best!)
  return {
    id: row.id,
    number: row.number,
    name: row.name,
    form: row.form,
    sense: row.sense,
    variables: row.variables,
    interactions: row.interactions,
    density: row.structure.density,
    embedding: shown
      ? {
          id: shown.embedding.id,
          number: shown.embedding.number,
          status: shown.embedding.status,
          machine: shown.machine,
          longestChain: shown.embedding.stats?.chainLength.max ?? null,
        }
      : null,
    runSheet: sheet ? { id: sheet.id, number: sheet.number, state: sheet.state } : null,
    best: energies.length > 0 ? signed(sign, Math.min(...energies)) : null,
    changedAt: row.changedAt.toISOString(),
  }
}

export async function problemView(app: App, actor: Actor, id: string): Promise<ProblemView> {
  const row = await problemRow(app, actor, id)
  const context = await contextOf(app, [id])
  const { embedding: _embedding, runSheet: _runSheet, ...item } = itemOf(row, context)
  const { problem } = await problemData(app, row)
  return {
    ...item,
    note: row.note,
    offset: signed(signOf(row.sense), problem.offset),
    fingerprint: row.fingerprint,
    source: row.source,
    reading: row.reading,
    structure: row.structure,
    embeddings: context.embeddings.map(({ embedding, machine, qubits }) => ({
      id: embedding.id,
      number: embedding.number,
      status: embedding.status,
      machineId: embedding.machineId,
      machine,
      calibration: embedding.calibration,
      method: embedding.method,
      methodUsed: embedding.methodUsed,
      seed: embedding.seed,
      objective: embedding.objective,
      chosen: embedding.chosen,
      stats: statsView(embedding.stats, qubits),
      longestChain: embedding.stats?.chainLength.max ?? null,
      qubitsUsed: embedding.stats?.qubitsUsed ?? null,
      seconds: embedding.seconds,
      createdAt: embedding.createdAt.toISOString(),
      runSheets: context.sheets
        .filter((sheet) => sheet.embeddingId === embedding.id)
        .map(({ id, number, state }) => ({ id, number, state })),
    })),
    createdBy: await personOf(app.db, row.createdBy),
    createdAt: row.createdAt.toISOString(),
  }
}

export async function editProblem(
  app: App,
  actor: Actor,
  id: string,
  edit: z.infer<typeof editProblemSchema>,
): Promise<void> {
  await problemRow(app, actor, id)
  await updateProblem(app.db, id, { ...edit, changedAt: app.now() })
}

/** Deletes a problem with its embeddings, run sheets and samples. */
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
  const row = await problemRow(app, actor, id)
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
export async function energiesOf(app: App, actor: Actor, id: string, request: EnergyRequest): Promise<number[]> {
  const row = await problemRow(app, actor, id)
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
