import { createHash, randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { PresolveSummary, ReductionLinks } from '../../shared/schemas/presolve'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import type { NewVersion, ProblemRow } from '../database/repositories/problems'
import { findProblem, insertProblem } from '../database/repositories/problems'
import type { ReductionRow } from '../database/repositories/reductions'
import { findReduction, insertReduction, listReduced } from '../database/repositories/reductions'
import { liftingOf } from './lifting'
import { requirePresolvable, summaryOf } from './presolve'
import type { PresolvedProblem } from './presolve-runs'
import { presolved } from './presolve-runs'
import type { ProblemData } from './problem-data'
import { packProblem } from './problem-data'
import { problemRow } from './problems'
import type { ReductionLevel } from './reduction-record'
import { coefficientsOf, packRecord, unpackRecord } from './reduction-record'
import { signed, signOf } from './sense'

const MAX_NAME = 120
const reducedName = (name: string): string => `${name.slice(0, MAX_NAME - ' reduced'.length).trimEnd()} reduced`

function requireSmaller(row: ProblemRow, summary: PresolveSummary): void {
  const { optimum, before, after } = summary
  if (optimum !== null)
    throw new DomainError(
      'wrong state',
      'presolve.solved',
      `Nothing is left of P-${row.number}: pre-solve settled every variable. The optimum is ${optimum}, proved.`,
    )
  if (after.variables === before.variables)
    throw new DomainError(
      'wrong state',
      'presolve.nothing',
      `Pre-solve takes no variable out of P-${row.number}: there is nothing smaller to save.`,
    )
}

function levelOf(row: ProblemRow, { reduction, data }: PresolvedProblem): ReductionLevel {
  const { form, variables, kept, steps } = reduction
  const source = { id: row.id, number: row.number, name: row.name, version: row.version }
  return { form, variables, kept, steps, labels: data.labels, sense: row.sense, source }
}

const FIRST_ROWS = 5

/** What is kept with the first version of the reduced problem, besides its data. */
function versionOf(row: ProblemRow, { structure }: PresolvedProblem, made: ProblemData, bytes: Uint8Array) {
  const { form, labels, problem } = made
  const sign = signOf(row.sense)
  const firstRows = Array.from(problem.linear.subarray(0, FIRST_ROWS), (value, i): [string, string, number] => [
    labels[i]!,
    labels[i]!,
    signed(sign, value),
  ])
  return {
    form,
    sense: row.sense,
    remark: `what pre-solve leaves of P-${row.number}, version ${row.version}`,
    variables: problem.n,
    interactions: problem.values.length,
    source: {
      fileName: `P-${row.number}, version ${row.version}, reduced`,
      bytes: bytes.byteLength,
      sha256: createHash('sha256').update(bytes).digest('hex'),
    },
    reading: {
      ...row.reading,
      triangle: 'upper',
      entriesRead: problem.n + problem.values.length,
      duplicatesSummed: 0,
      zerosDropped: 0,
      firstRows,
      rejected: [],
      rejectedCount: 0,
      rejectedBlobId: undefined,
    },
    structure: {
      ...structure,
      degreeHistogram: [...structure.degreeHistogram],
      linearHistogram: [...structure.linearHistogram],
      interactionHistogram: [...structure.interactionHistogram],
    },
  } satisfies Partial<NewVersion>
}

/**
 * Saves what pre-solve leaves of a problem as a problem of its own, linked to it, so that answers can be lifted back.
 * @throws DomainError wrong state when nothing is left, naming the optimum, or nothing was taken out
 */
export async function saveReduced(
  app: App,
  actor: Actor,
  id: string,
  { version, name }: { version?: number; name?: string },
): Promise<{ id: string; number: number; name: string; variables: number; interactions: number }> {
  const row = await problemRow(app, actor, id, version)
  requirePresolvable(row)
  const result = await presolved(app, row)
  const summary = summaryOf(row, result)
  requireSmaller(row, summary)
  const { reduction, data } = result
  const labels = Array.from(reduction.kept, (v) => data.labels[v]!)
  const made: ProblemData = { form: reduction.form, labels, problem: reduction.problem }
  const { bytes, fingerprint } = packProblem(made)
  const before = await liftingOf(app, row, data)
  const record = { coefficients: coefficientsOf(made), levels: [levelOf(row, result), ...(before?.levels ?? [])] }
  const [dataBlobId, blobId] = [await app.blobs.write(bytes), await app.blobs.write(packRecord(record))]
  const stored = { dataBlobId, fingerprint, ...versionOf(row, result, made, bytes) }
  const title = name ?? reducedName(row.name)
  const link = { sourceId: id, sourceVersion: row.version, blobId, summary: { ...summary }, seconds: result.seconds }
  const saved = await store(app, actor, { name: title, tags: row.tags }, stored, link)
  return { ...saved, name: title, ...summary.after }
}

type Stored = Omit<NewVersion, 'versionBy' | 'versionAt'>
type Link = Omit<ReductionRow, 'problemId' | 'version' | 'createdAt'>

/** Stores the reduced problem and the link to its source, both or neither. */
async function store(
  app: App,
  { userId, workspaceId }: Actor,
  head: { name: string; tags: string[] },
  stored: Stored,
  link: Link,
): Promise<{ id: string; number: number }> {
  const id = randomUUID()
  const now = app.now()
  const number = await app.db.transaction(async (tx) => {
    const number = await nextNumber(tx, workspaceId, 'problem')
    await app.blobs.adopt(tx, stored.dataBlobId)
    await app.blobs.adopt(tx, link.blobId)
    const made = { createdBy: userId, createdAt: now, changedAt: now }
    await insertProblem(
      tx,
      { id, workspaceId, number, ...head, ...made },
      { ...stored, versionBy: userId, versionAt: now },
    )
    await insertReduction(tx, { ...link, problemId: id, version: app.version, createdAt: now })
    return number
  })
  return { id, number }
}

/** Where a problem was reduced from, and what it was reduced to. */
export async function reductionLinks(app: App, { id, workspaceId }: ProblemRow): Promise<ReductionLinks> {
  const reduction = await findReduction(app.db, id)
  const reduced = await listReduced(app.db, id)
  if (!reduction) return { reducedFrom: null, reduced }
  const { source } = unpackRecord(await app.blobs.read(reduction.blobId)).levels[0]!
  const current = await findProblem(app.db, workspaceId, source.id)
  const summary = reduction.summary as unknown as PresolveSummary
  return {
    reducedFrom: {
      ...source,
      name: current?.name ?? source.name,
      summary,
      isThere: current !== undefined,
      seconds: reduction.seconds,
      by: reduction.version,
    },
    reduced,
  }
}
