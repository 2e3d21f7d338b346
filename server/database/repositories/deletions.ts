import { and, eq, gte, inArray, isNull, lt, or } from 'drizzle-orm'
import type { DeletableKind } from '../../../shared/schemas/deletions'
import type { Db } from '../client'
import {
  embeddings,
  problems,
  problemVersions,
  reductions,
  referenceOptima,
  returns,
  runSheets,
  scans,
} from '../schema'
import type { Deleted } from './jobs'

const ROOTS = { problem: problems, embedding: embeddings, 'run sheet': runSheets } as const
/** From what stands on others to what carries them. */
const TABLES = [scans, returns, runSheets, embeddings, problems] as const

const embeddingsUnder = (kind: DeletableKind, id: string) =>
  kind === 'problem' ? eq(embeddings.problemId, id) : eq(embeddings.id, kind === 'embedding' ? id : '')

function runSheetsUnder(db: Db, kind: DeletableKind, id: string) {
  if (kind === 'run sheet') return eq(runSheets.id, id)
  const carriers = db.select({ id: embeddings.id }).from(embeddings).where(embeddingsUnder(kind, id))
  return inArray(runSheets.embeddingId, carriers)
}

/** Returns or scans of run sheets under a thing, and those made on an embedding under it. */
function samplesUnder(db: Db, table: typeof returns | typeof scans, kind: DeletableKind, id: string) {
  const carriers = db
    .select({ id: runSheets.id })
    .from(runSheets)
    .where(runSheetsUnder(db, kind, id))
  const ofRunSheet = inArray(table.runSheetId, carriers)
  if (kind === 'run sheet') return ofRunSheet
  // A run sheet may have moved to another embedding since: its earlier returns stay with the one they were made on.
  const on = db.select({ id: embeddings.id }).from(embeddings).where(embeddingsUnder(kind, id))
  return or(ofRunSheet, inArray(table.embeddingId, on))
}

/**
 * Takes a thing and what stands on it out of sight. What was deleted before keeps its own mark, so that undoing this
 * deletion does not bring it back. False when the thing is out of sight already.
 */
export async function hide(tx: Db, kind: DeletableKind, id: string, at: Date): Promise<boolean> {
  const mark = { deletedAt: at, deletedWith: id }
  const root = ROOTS[kind]
  const hidden = await tx
    .update(root)
    .set(mark)
    .where(and(eq(root.id, id), isNull(root.deletedWith)))
    .returning({ id: root.id })
  if (hidden.length === 0) return false
  await tx
    .update(embeddings)
    .set(mark)
    .where(and(embeddingsUnder(kind, id), isNull(embeddings.deletedWith)))
  await tx
    .update(runSheets)
    .set(mark)
    .where(and(runSheetsUnder(tx, kind, id), isNull(runSheets.deletedWith)))
  for (const table of [returns, scans])
    await tx
      .update(table)
      .set(mark)
      .where(and(samplesUnder(tx, table, kind, id), isNull(table.deletedWith)))
  return true
}

/** A thing of the workspace that was itself deleted at the moment given or later. */
export async function findHidden(db: Db, kind: DeletableKind, workspaceId: string, id: string, since: Date) {
  const root = ROOTS[kind]
  const rows = await db
    .select({ id: root.id, number: root.number })
    .from(root)
    .where(
      and(eq(root.workspaceId, workspaceId), eq(root.id, id), eq(root.deletedWith, id), gte(root.deletedAt, since)),
    )
    .for('update')
  return rows[0]
}

/** Whether what a thing stands on is out of sight. */
export async function carrierHidden(db: Db, kind: DeletableKind, id: string): Promise<boolean> {
  if (kind === 'problem') return false
  const rows =
    kind === 'embedding'
      ? await db
          .select({ with: problems.deletedWith })
          .from(embeddings)
          .innerJoin(problems, eq(problems.id, embeddings.problemId))
          .where(eq(embeddings.id, id))
      : await db
          .select({ with: embeddings.deletedWith })
          .from(runSheets)
          .innerJoin(embeddings, eq(embeddings.id, runSheets.embeddingId))
          .where(eq(runSheets.id, id))
  return rows.some((row) => row.with !== null)
}

/** Brings back everything that was deleted with a thing. */
export async function unhide(tx: Db, id: string): Promise<void> {
  for (const table of TABLES)
    await tx.update(table).set({ deletedAt: null, deletedWith: null }).where(eq(table.deletedWith, id))
}

/** Things that were themselves deleted before the moment given. */
export async function hiddenBefore(db: Db, kind: DeletableKind, before: Date): Promise<string[]> {
  const root = ROOTS[kind]
  const rows = await db
    .select({ id: root.id })
    .from(root)
    .where(and(eq(root.deletedWith, root.id), lt(root.deletedAt, before)))
  return rows.map(({ id }) => id)
}

/**
 * Deletes a thing for good, with everything that stands on it, if it still is deleted since before the moment given.
 * Undefined when it was brought back or is gone already.
 */
export async function deleteForGood(
  tx: Db,
  kind: DeletableKind,
  id: string,
  before: Date,
): Promise<Deleted | undefined> {
  const root = ROOTS[kind]
  const held = await tx
    .select({ id: root.id })
    .from(root)
    .where(and(eq(root.id, id), eq(root.deletedWith, id), lt(root.deletedAt, before)))
    .for('update')
  if (held.length === 0) return undefined
  const data = kind === 'problem' ? await dataOf(tx, id) : { blobs: [], references: [] }
  const chains = await tx
    .select({ id: embeddings.id, blobId: embeddings.chainsBlobId })
    .from(embeddings)
    .where(embeddingsUnder(kind, id))
  const samples = await tx
    .select({
      id: returns.id,
      blobId: returns.samplesBlobId,
      breaksBlobId: returns.breaksBlobId,
      summaryBlobId: returns.summaryBlobId,
    })
    .from(returns)
    .where(samplesUnder(tx, returns, kind, id))
  const derived = samples
    .flatMap(({ breaksBlobId, summaryBlobId }) => [breaksBlobId, summaryBlobId])
    .map((blobId) => ({ blobId }))
  const scanned = await tx
    .select({ id: scans.id })
    .from(scans)
    .where(samplesUnder(tx, scans, kind, id))
  await tx.delete(root).where(eq(root.id, id))
  return {
    blobIds: [...data.blobs, ...data.references, ...chains, ...samples, ...derived].flatMap(
      ({ blobId }) => blobId ?? [],
    ),
    subjectIds: [...data.references, ...chains, ...samples, ...scanned].map((row) => row.id),
  }
}

/** What a problem itself keeps: its versions, the record of its reduction, its reference optima. */
async function dataOf(tx: Db, problemId: string) {
  const versions = tx
    .select({ blobId: problemVersions.dataBlobId, reading: problemVersions.reading })
    .from(problemVersions)
    .where(eq(problemVersions.problemId, problemId))
  const reduction = tx.select({ blobId: reductions.blobId }).from(reductions).where(eq(reductions.problemId, problemId))
  const kept = await versions
  // Versions that differ in labels alone share the list of rejected lines.
  const rejected = [...new Set(kept.map(({ reading }) => reading.rejectedBlobId))].map((blobId) => ({ blobId }))
  const blobs = [...kept, ...rejected, ...(await reduction)]
  const references = await tx
    .select({ id: referenceOptima.id, blobId: referenceOptima.stateBlobId })
    .from(referenceOptima)
    .where(eq(referenceOptima.problemId, problemId))
  return { blobs, references }
}
