import { and, desc, eq, isNotNull, lte } from 'drizzle-orm'
import type { Db } from '../client'
import { capacityMeasurements, machines } from '../schema'

export type CapacityRow = typeof capacityMeasurements.$inferSelect

export async function insertCapacity(db: Db, row: typeof capacityMeasurements.$inferInsert): Promise<void> {
  await db.insert(capacityMeasurements).values(row)
}

/** A measurement by its id alone, for its job. */
export async function findCapacity(db: Db, id: string): Promise<CapacityRow | undefined> {
  return (await db.select().from(capacityMeasurements).where(eq(capacityMeasurements.id, id)))[0]
}

/** False when it was deleted with its machine meanwhile. */
export async function updateCapacity(
  db: Db,
  id: string,
  set: Partial<typeof capacityMeasurements.$inferInsert>,
): Promise<boolean> {
  const rows = await db
    .update(capacityMeasurements)
    .set(set)
    .where(eq(capacityMeasurements.id, id))
    .returning({ id: capacityMeasurements.id })
  return rows.length === 1
}

/** The newest measurement that ended with a result, at a calibration or, failing that, at the last one before it. */
export async function newestMeasured(db: Db, machineId: string, calibration: number): Promise<CapacityRow | undefined> {
  const rows = await db
    .select()
    .from(capacityMeasurements)
    .where(
      and(
        eq(capacityMeasurements.machineId, machineId),
        lte(capacityMeasurements.calibration, calibration),
        eq(capacityMeasurements.status, 'measured'),
        isNotNull(capacityMeasurements.result),
      ),
    )
    .orderBy(desc(capacityMeasurements.calibration), desc(capacityMeasurements.createdAt))
    .limit(1)
  return rows[0]
}

export async function newestCapacity(db: Db, machineId: string, calibration: number): Promise<CapacityRow | undefined> {
  const rows = await db
    .select()
    .from(capacityMeasurements)
    .where(and(eq(capacityMeasurements.machineId, machineId), eq(capacityMeasurements.calibration, calibration)))
    .orderBy(desc(capacityMeasurements.createdAt))
    .limit(1)
  return rows[0]
}

/** Whether a measurement of the machine is under way; holds the machine, so that of two starts one sees the other. */
export async function capacityUnderWay(tx: Db, machineId: string): Promise<boolean> {
  await tx.select({ id: machines.id }).from(machines).where(eq(machines.id, machineId)).for('update')
  const rows = await tx
    .select({ id: capacityMeasurements.id })
    .from(capacityMeasurements)
    .where(and(eq(capacityMeasurements.machineId, machineId), eq(capacityMeasurements.status, 'running')))
    .limit(1)
  return rows.length > 0
}
