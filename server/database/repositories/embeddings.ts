import { and, desc, eq, inArray, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { calibrations, embeddings, machines, problems } from '../schema'

export type EmbeddingRow = typeof embeddings.$inferSelect

export async function insertEmbedding(db: Db, row: typeof embeddings.$inferInsert): Promise<EmbeddingRow> {
  return (await db.insert(embeddings).values(row).returning())[0]!
}

export async function findEmbedding(db: Db, workspaceId: string, id: string): Promise<EmbeddingRow | undefined> {
  return (
    await db
      .select()
      .from(embeddings)
      .where(and(eq(embeddings.workspaceId, workspaceId), eq(embeddings.id, id), isNull(embeddings.deletedWith)))
  )[0]
}

/** An embedding by its id alone, deleted or not, for jobs, which are not asked for by anyone. */
export async function findEmbeddingOfJob(db: Db, id: string): Promise<EmbeddingRow | undefined> {
  return (await db.select().from(embeddings).where(eq(embeddings.id, id)))[0]
}

/** False when the embedding was deleted meanwhile. */
export async function updateEmbedding(
  db: Db,
  id: string,
  set: Partial<typeof embeddings.$inferInsert>,
): Promise<boolean> {
  const rows = await db.update(embeddings).set(set).where(eq(embeddings.id, id)).returning({ id: embeddings.id })
  return rows.length === 1
}

/** Sets or takes away the mark of the one to go on with; setting it takes it from any other of the same pair. */
export async function markChosen(tx: Db, { id, problemId, machineId }: EmbeddingRow, chosen: boolean): Promise<void> {
  // One after the other: two people choosing at once must not leave two marks.
  await tx.select({ id: problems.id }).from(problems).where(eq(problems.id, problemId)).for('update')
  if (chosen)
    await tx
      .update(embeddings)
      .set({ chosen: false })
      .where(and(eq(embeddings.problemId, problemId), eq(embeddings.machineId, machineId), embeddings.chosen))
  await tx.update(embeddings).set({ chosen }).where(eq(embeddings.id, id))
}

/** An embedding's number with its problem's, for those that were begun from it. */
export async function findNumbers(db: Db, id: string) {
  return (
    await db
      .select({ id: embeddings.id, number: embeddings.number, problem: { id: problems.id, number: problems.number } })
      .from(embeddings)
      .innerJoin(problems, eq(problems.id, embeddings.problemId))
      .where(and(eq(embeddings.id, id), isNull(embeddings.deletedWith)))
  )[0]
}

/** Embeddings of several problems with the machine's name and its working qubits then, newest first. */
export async function embeddingsOfProblems(db: Db, problemIds: readonly string[]) {
  if (problemIds.length === 0) return []
  return db
    .select({ embedding: embeddings, machine: machines.name, qubits: calibrations.qubits })
    .from(embeddings)
    .innerJoin(machines, eq(machines.id, embeddings.machineId))
    .innerJoin(
      calibrations,
      and(eq(calibrations.machineId, embeddings.machineId), eq(calibrations.number, embeddings.calibration)),
    )
    .where(and(inArray(embeddings.problemId, [...problemIds]), isNull(embeddings.deletedWith)))
    .orderBy(desc(embeddings.createdAt), desc(embeddings.number))
}

/** Found embeddings on a machine with their problem's name, also those whose deletion can still be undone. */
export async function foundEmbeddingsOn(db: Db, machineId: string) {
  return db
    .select({ embedding: embeddings, problem: problems.name })
    .from(embeddings)
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .where(and(eq(embeddings.machineId, machineId), eq(embeddings.status, 'found')))
    .orderBy(embeddings.createdAt, embeddings.id)
}

/** Repairs of embeddings that were to take their place, newest first. */
export async function replacementsOf(db: Db, startIds: readonly string[]): Promise<EmbeddingRow[]> {
  if (startIds.length === 0) return []
  return db
    .select()
    .from(embeddings)
    .where(and(inArray(embeddings.startId, [...startIds]), embeddings.replaces, isNull(embeddings.deletedWith)))
    .orderBy(desc(embeddings.createdAt), desc(embeddings.number))
}

/** Waits for others who are about to put something in the embedding's place. */
export async function lockEmbedding(tx: Db, id: string): Promise<void> {
  await tx.select({ id: embeddings.id }).from(embeddings).where(eq(embeddings.id, id)).for('update')
}
