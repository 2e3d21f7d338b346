import { and, asc, count, desc, eq, isNull } from 'drizzle-orm'
import type { Db } from '../client'
import { brokenEmbeddings, calibrations, embeddings, machines, problems, users } from '../schema'

export type MachineRow = typeof machines.$inferSelect
export type CalibrationRow = typeof calibrations.$inferSelect

export async function insertMachine(db: Db, row: typeof machines.$inferInsert): Promise<void> {
  await db.insert(machines).values(row)
}

export async function machineNameTaken(db: Db, workspaceId: string, name: string): Promise<boolean> {
  const rows = await db
    .select({ id: machines.id })
    .from(machines)
    .where(and(eq(machines.workspaceId, workspaceId), eq(machines.name, name)))
  return rows.length > 0
}

export async function insertCalibration(db: Db, row: typeof calibrations.$inferInsert): Promise<void> {
  await db.insert(calibrations).values(row)
}

/** Moves the machine on to its next calibration; false when somebody else did so meanwhile. */
export async function advanceCalibration(db: Db, id: string, from: number, at: Date): Promise<boolean> {
  const rows = await db
    .update(machines)
    .set({ calibration: from + 1, changedAt: at })
    .where(and(eq(machines.id, id), eq(machines.calibration, from)))
    .returning({ id: machines.id })
  return rows.length === 1
}

export async function findMachine(db: Db, workspaceId: string, id: string): Promise<MachineRow | undefined> {
  return (
    await db
      .select()
      .from(machines)
      .where(and(eq(machines.workspaceId, workspaceId), eq(machines.id, id)))
  )[0]
}

export async function findCalibration(db: Db, machineId: string, number: number): Promise<CalibrationRow | undefined> {
  return (
    await db
      .select()
      .from(calibrations)
      .where(and(eq(calibrations.machineId, machineId), eq(calibrations.number, number)))
  )[0]
}

/** Machines with the figures of the calibration in force, by name. */
export async function listMachines(db: Db, workspaceId: string, limit: number, offset: number) {
  return db
    .select({ machine: machines, qubits: calibrations.qubits, couplers: calibrations.couplers })
    .from(machines)
    .innerJoin(
      calibrations,
      and(eq(calibrations.machineId, machines.id), eq(calibrations.number, machines.calibration)),
    )
    .where(eq(machines.workspaceId, workspaceId))
    .orderBy(machines.name)
    .limit(limit)
    .offset(offset)
}

export async function listCalibrations(db: Db, machineId: string) {
  return db
    .select({ calibration: calibrations, savedBy: { id: users.id, name: users.name } })
    .from(calibrations)
    .innerJoin(users, eq(users.id, calibrations.createdBy))
    .where(eq(calibrations.machineId, machineId))
    .orderBy(desc(calibrations.number))
}

export async function insertBrokenEmbeddings(db: Db, rows: (typeof brokenEmbeddings.$inferInsert)[]): Promise<void> {
  if (rows.length > 0) await db.insert(brokenEmbeddings).values(rows)
}

/** Embeddings that calibrations of a machine broke, with their problem; deleted ones left out. */
export async function listBrokenEmbeddings(db: Db, machineId: string) {
  return db
    .select({ broken: brokenEmbeddings, embedding: embeddings, problem: problems.name })
    .from(brokenEmbeddings)
    .innerJoin(embeddings, eq(embeddings.id, brokenEmbeddings.embeddingId))
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .where(and(eq(brokenEmbeddings.machineId, machineId), isNull(embeddings.deletedWith)))
    .orderBy(desc(brokenEmbeddings.calibration), asc(problems.name), asc(embeddings.number))
}

export async function countEmbeddingsOn(db: Db, machineId: string): Promise<number> {
  const standing = and(eq(embeddings.machineId, machineId), isNull(embeddings.deletedWith))
  return (await db.select({ n: count() }).from(embeddings).where(standing))[0]!.n
}
