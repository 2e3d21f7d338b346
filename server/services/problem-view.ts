import type { VersionStanding } from '../../shared/schemas/problem-versions'
import type { EmbeddingOfProblem, ProblemView } from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import { findVersionMaker } from '../database/repositories/problem-versions'
import type { ProblemRow } from '../database/repositories/problems'
import { findProblem, personOf } from '../database/repositories/problems'
import { statsView } from './embedding-stats'
import { standingOf } from './problem-difference'
import type { ProblemContext } from './problem-items'
import { contextOf, itemOf } from './problem-items'
import { problemData, problemRow } from './problems'
import { reductionLinks } from './reductions'
import { signed, signOf } from './sense'

/** How each version that something was made for stands to the current one. */
async function standingsOf(app: App, row: ProblemRow, versions: Iterable<number>) {
  const standings = new Map<number, VersionStanding>()
  for (const version of new Set(versions)) {
    const made = await problemRow(app, row, row.id, version)
    standings.set(version, await standingOf(app, made))
  }
  return standings
}

function embeddingOf(
  { embedding, machine, qubits }: ProblemContext['embeddings'][number],
  sheets: ProblemContext['sheets'],
  ofVersion: VersionStanding,
): EmbeddingOfProblem {
  return {
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
    ofVersion,
    runSheets: sheets
      .filter((sheet) => sheet.embeddingId === embedding.id)
      .map(({ id, number, state }) => ({ id, number, state })),
  }
}

async function supersededBy(app: App, { id, version }: ProblemRow): Promise<ProblemView['superseded']> {
  const next = await findVersionMaker(app.db, id, version + 1)
  return next ? { at: next.at.toISOString(), by: next.by } : null
}

/** Where it comes from; what it was copied from only while that is there. */
async function sourceView(app: App, { workspaceId, source }: ProblemRow): Promise<ProblemView['source']> {
  const { change: _change, copyOf, ...rest } = source
  const original = copyOf && (await findProblem(app.db, workspaceId, copyOf.id))
  return original ? { ...rest, copyOf } : rest
}

/** A problem at one of its versions, without a number at the current one, with all that was built on any of them. */
export async function problemView(app: App, actor: Actor, id: string, version?: number): Promise<ProblemView> {
  const row = await problemRow(app, actor, id, version)
  const context = await contextOf(app, [id])
  const { embedding: _embedding, runSheet: _runSheet, ...item } = itemOf(row, context)
  const { problem } = await problemData(app, row)
  const standings = await standingsOf(
    app,
    row,
    context.embeddings.map(({ embedding }) => embedding.problemVersion),
  )
  return {
    ...item,
    note: row.note,
    version: row.version,
    versionBy: await personOf(app.db, row.versionBy),
    versionAt: row.versionAt.toISOString(),
    remark: row.remark,
    superseded: await supersededBy(app, row),
    offset: signed(signOf(row.sense), problem.offset),
    fingerprint: row.fingerprint,
    source: await sourceView(app, row),
    reading: row.reading,
    structure: row.structure,
    embeddings: context.embeddings.map((made) =>
      embeddingOf(made, context.sheets, standings.get(made.embedding.problemVersion)!),
    ),
    ...(await reductionLinks(app, row)),
    createdBy: await personOf(app.db, row.createdBy),
    createdAt: row.createdAt.toISOString(),
  }
}
