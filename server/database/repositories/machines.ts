import { and, asc, count, desc, eq, isNull, sql } from 'drizzle-orm'
import type { MachineSheet } from '../../../shared/schemas/machines'
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

/** Every calibration, newest first: of the sheets only what the list shows, since tables and defects may be long. */
export async function listCalibrations(db: Db, machineId: string) {
  const { sheet } = calibrations
  return db
    .select({
      number: calibrations.number,
      qubits: calibrations.qubits,
      couplers: calibrations.couplers,
      createdAt: calibrations.createdAt,
      controlError: sql<MachineSheet['controlError']>`${sheet} -> 'controlError'`,
      temperatureMillikelvin: sql<number | null>`(${sheet} ->> 'temperatureMillikelvin')::double precision`,
      remark: sql<string>`coalesce(${sheet} ->> 'remark', '')`,
      savedBy: { id: users.id, name: users.name },
    })
    .from(calibrations)
    .innerJoin(users, eq(users.id, calibrations.createdBy))
    .where(eq(calibrations.machineId, machineId))
    .orderBy(desc(calibrations.number))
}

/** One calibration with who saved it. */
export async function findSavedCalibration(db: Db, machineId: string, number: number) {
  return (
    await db
      .select({ calibration: calibrations, savedBy: { id: users.id, name: users.name } })
      .from(calibrations)
      .innerJoin(users, eq(users.id, calibrations.createdBy))
      .where(and(eq(calibrations.machineId, machineId), eq(calibrations.number, number)))
  )[0]
}

export async function insertBrokenEmbeddings(db: Db, rows: (typeof brokenEmbeddings.$inferInsert)[]): Promise<void> {
  if (rows.length > 0) await db.insert(brokenEmbeddings).values(rows)
}

export type BrokenRow = typeof brokenEmbeddings.$inferSelect

const isBroken = ({ machineId, calibration, embeddingId }: Omit<BrokenRow, 'damage' | 'holdsAgain'>) =>
  and(
    eq(brokenEmbeddings.machineId, machineId),
    eq(brokenEmbeddings.calibration, calibration),
    eq(brokenEmbeddings.embeddingId, embeddingId),
  )

/** Embeddings of a machine that were broken and have not held since. */
export async function openBroken(db: Db, machineId: string): Promise<BrokenRow[]> {
  return db
    .select()
    .from(brokenEmbeddings)
    .where(and(eq(brokenEmbeddings.machineId, machineId), isNull(brokenEmbeddings.holdsAgain)))
}

/** Notes that an embedding holds again, as it is. */
export async function endBroken(db: Db, row: BrokenRow, calibration: number): Promise<void> {
  await db.update(brokenEmbeddings).set({ holdsAgain: calibration }).where(isBroken(row))
}

/** The damage of an embedding that was broken before is that by the calibration in force. */
export async function updateDamage(db: Db, row: BrokenRow, damage: BrokenRow['damage']): Promise<void> {
  await db.update(brokenEmbeddings).set({ damage }).where(isBroken(row))
}

/** The calibration in force; no other is saved before the transaction ends. */
export async function lockCalibration(tx: Db, machineId: string): Promise<number | undefined> {
  const rows = await tx
    .select({ calibration: machines.calibration })
    .from(machines)
    .where(eq(machines.id, machineId))
    .for('share')
  return rows[0]?.calibration
}

/** Embeddings that calibrations of a machine broke, with their problem and who made them; deleted ones left out. */
export async function listBrokenEmbeddings(db: Db, machineId: string) {
  return db
    .select({
      broken: brokenEmbeddings,
      embedding: embeddings,
      problem: { id: problems.id, number: problems.number, name: problems.name },
      createdBy: { id: users.id, name: users.name },
    })
    .from(brokenEmbeddings)
    .innerJoin(embeddings, eq(embeddings.id, brokenEmbeddings.embeddingId))
    .innerJoin(problems, eq(problems.id, embeddings.problemId))
    .innerJoin(users, eq(users.id, embeddings.createdBy))
    .where(and(eq(brokenEmbeddings.machineId, machineId), isNull(embeddings.deletedWith)))
    .orderBy(desc(brokenEmbeddings.calibration), asc(problems.name), asc(embeddings.number))
}

export async function countEmbeddingsOn(db: Db, machineId: string): Promise<number> {
  const standing = and(eq(embeddings.machineId, machineId), isNull(embeddings.deletedWith))
  return (await db.select({ n: count() }).from(embeddings).where(standing))[0]!.n
}
