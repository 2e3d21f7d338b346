import { csvCell } from '../../shared/csv'
import { DomainError } from '../../shared/errors'
import type { Page } from '../../shared/schemas/common'
import type {
  ReferenceItem,
  ReferencePart,
  ReferencesQuery,
  ReferenceStatus,
  ReferenceView,
} from '../../shared/schemas/reference'
import { optimumMethodSchema } from '../../shared/schemas/reference'
import type { Actor, App } from '../app'
import { jobsOfSubjects } from '../database/repositories/jobs'
import { readPage } from '../database/repositories/pages'
import { personOf } from '../database/repositories/problems'
import type { ProblemRow } from '../database/repositories/problems'
import type { ReferenceRow } from '../database/repositories/reference-optima'
import { bestReference, listReferences } from '../database/repositories/reference-optima'
import { problemData, problemRow } from './problems'
import { signed, signOf } from './sense'

/** Labels of variables that are up, named in a list. */
const NAMED = 40

/** Figures kept in the row's `detail`. */
export interface ReferenceDetail {
  parts: ReferencePart[]
  isolated: number
  tolerance: number
  optima: number | null
  up: ReferenceItem['up']
}

const NO_DETAIL: ReferenceDetail = { parts: [], isolated: 0, tolerance: 0, optima: null, up: null }

const statusOf = ({ status, proved }: ReferenceRow): ReferenceStatus => {
  if (status !== 'found') return status
  return proved ? 'proved' : 'best found'
}

function settingsOf({ settings }: ReferenceRow): ReferenceItem['settings'] {
  const method = optimumMethodSchema.safeParse(settings.method)
  return {
    seed: Number(settings.seed),
    timeLimitSeconds: Number(settings.timeLimitSeconds),
    method: method.success ? method.data : null,
  }
}

async function itemOf(app: App, row: ReferenceRow, sense: 'min' | 'max', jobId: string | null): Promise<ReferenceItem> {
  const sign = signOf(sense)
  const { energy, bound } = row
  const detail = { ...NO_DETAIL, ...row.detail }
  return {
    id: row.id,
    problemVersion: row.problemVersion,
    status: statusOf(row),
    jobId,
    energy: energy === null ? null : signed(sign, energy),
    bound: bound === null ? null : signed(sign, bound),
    gap: energy === null || bound === null ? null : Math.abs(energy - bound),
    ...detail,
    method: row.method,
    settings: settingsOf(row),
    seconds: row.seconds,
    version: row.version,
    reason: row.reason,
    createdBy: await personOf(app.db, row.createdBy),
    createdAt: row.createdAt.toISOString(),
  }
}

/** Looks for the optimum of one version of a problem, newest first; a running one with its job. */
export async function referencesOf(
  app: App,
  actor: Actor,
  problemId: string,
  query: ReferencesQuery,
): Promise<Page<ReferenceItem>> {
  const problem = await problemRow(app, actor, problemId, query.version)
  const { items: rows, nextCursor } = await readPage(
    query,
    (place) => listReferences(app.db, problemId, problem.version, place),
    (row) => row,
  )
  const jobIds = await jobsOfSubjects(
    app.db,
    rows.map(({ id }) => id),
  )
  const items = await Promise.all(rows.map((row) => itemOf(app, row, problem.sense, jobIds.get(row.id) ?? null)))
  return { items, nextCursor }
}

async function requireBest(app: App, problem: ProblemRow): Promise<ReferenceRow> {
  const best = await bestReference(app.db, problem.id, problem.version)
  if (best) return best
  const [newest] = await listReferences(app.db, problem.id, problem.version, { limit: 1, offset: 0 })
  const why: Record<ReferenceRow['status'], string> = {
    running: 'The look for it is under way.',
    cancelled: 'The look for it was cancelled before it had any state.',
    failed: `The look for it failed: ${newest?.reason ?? 'for no known reason'}.`,
    found: '',
  }
  throw new DomainError(
    'not found',
    'reference.none',
    `There is no reference optimum of version ${problem.version}. ${newest ? why[newest.status] : 'Nobody has looked for it yet.'}`,
  )
}

interface Best {
  problem: ProblemRow
  row: ReferenceRow
  labels: string[]
  form: 'qubo' | 'ising'
  /** In the order of the variables, in the alphabet of the form. */
  values: number[]
}

async function loadBest(app: App, actor: Actor, problemId: string, version?: number): Promise<Best> {
  const problem = await problemRow(app, actor, problemId, version)
  const row = await requireBest(app, problem)
  const { labels, form } = await problemData(app, problem)
  const bytes = await app.blobs.read(row.stateBlobId!)
  const down = form === 'ising' ? -1 : 0
  return { problem, row, labels, form, values: Array.from(bytes, (value) => (value === 1 ? 1 : down)) }
}

/** The best known value of one version of a problem, with its state. @throws DomainError not found, saying why */
export async function referenceView(
  app: App,
  actor: Actor,
  problemId: string,
  version?: number,
): Promise<ReferenceView> {
  const { problem, row, labels, form, values } = await loadBest(app, actor, problemId, version)
  const jobIds = await jobsOfSubjects(app.db, [row.id])
  return {
    ...(await itemOf(app, row, problem.sense, jobIds.get(row.id) ?? null)),
    form,
    state: Object.fromEntries(labels.map((label, i) => [label, values[i]!])),
    values,
  }
}

/** The state as CSV: a line for each variable, in the order of the problem. */
export async function referenceFile(
  app: App,
  actor: Actor,
  problemId: string,
  version?: number,
): Promise<{ fileName: string; text: string }> {
  const { problem, labels, form, values } = await loadBest(app, actor, problemId, version)
  const lines = labels.map((label, i) => `${csvCell(label)},${values[i]}`)
  const text = [`variable,${form === 'qubo' ? 'x' : 's'}`, ...lines, ''].join('\n')
  return { fileName: `P-${problem.number}-optimum.csv`, text }
}

/** The first labels that are up in a state, and how many there are. */
export function upIn(labels: readonly string[], state: Uint8Array): NonNullable<ReferenceItem['up']> {
  const named: string[] = []
  let total = 0
  state.forEach((value, i) => {
    if (value !== 1) return
    if (total++ < NAMED) named.push(labels[i]!)
  })
  return { labels: named, total }
}
