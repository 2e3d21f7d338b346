import { randomUUID } from 'node:crypto'
import { couplerCount, qubitCount } from '../../shared/engine/machine/family'
import { degreeOf } from '../../shared/engine/graph/graph'
import { DomainError } from '../../shared/errors'
import type { CapacityCard, CapacityMeasured, MeasureCapacity } from '../../shared/schemas/machine-use'
import type { Actor, App } from '../app'
import type { CapacityRow } from '../database/repositories/capacity-measurements'
import {
  capacityUnderWay,
  insertCapacity,
  newestCapacity,
  newestMeasured,
} from '../database/repositories/capacity-measurements'
import { insertJob, jobsOfSubjects } from '../database/repositories/jobs'
import { personOf } from '../database/repositories/problems'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'

/** Queues a measurement of the longest chains at a calibration. @throws DomainError while another one is under way */
export async function measureCapacity(
  app: App,
  actor: Actor,
  machineId: string,
  { calibration: number, ...settings }: MeasureCapacity,
): Promise<{ id: string; jobId: string }> {
  const { calibration } = await calibratedMachine(app, actor, machineId, number)
  const [id, jobId, now] = [randomUUID(), randomUUID(), app.now()]
  const { workspaceId, userId: createdBy } = actor
  await app.db.transaction(async (tx) => {
    if (await capacityUnderWay(tx, machineId))
      throw new DomainError(
        'wrong state',
        'capacity.running',
        'A measurement of this machine is under way. Stop it, or wait until it is over.',
      )
    await insertCapacity(tx, {
      id,
      workspaceId,
      machineId,
      calibration: calibration.number,
      status: 'running',
      settings,
      version: app.version,
      createdBy,
      createdAt: now,
    })
    await insertJob(tx, { id: jobId, workspaceId, kind: 'capacity', subjectId: id, createdBy }, now)
  })
  await app.queue.announce(jobId)
  return { id, jobId }
}

async function measuredOf(app: App, row: CapacityRow): Promise<CapacityMeasured> {
  const jobs = await jobsOfSubjects(app.db, [row.id])
  return {
    id: row.id,
    calibration: row.calibration,
    status: row.status,
    jobId: jobs.get(row.id) ?? null,
    settings: row.settings,
    complete: row.result?.complete ?? null,
    points: row.result?.points ?? [],
    reason: row.reason,
    seconds: row.seconds,
    version: row.version,
    by: await personOf(app.db, row.createdBy),
    at: row.createdAt.toISOString(),
  }
}

/** The newest measurement that counts at a calibration; an earlier calibration's where it has none; null without any. */
export async function newestMeasurement(app: App, machineId: string, calibration: number) {
  const row = await newestMeasured(app.db, machineId, calibration)
  return row ? measuredOf(app, row) : null
}

function degreesOf({ graph, usable }: CalibratedMachine): CapacityCard['degrees'] {
  const counts = new Map<number, number>()
  usable.forEach((works, q) => {
    if (works) counts.set(degreeOf(graph, q), (counts.get(degreeOf(graph, q)) ?? 0) + 1)
  })
  return [...counts].sort(([a], [b]) => a - b).map(([degree, qubits]) => ({ degree, qubits }))
}

/** What is known of a machine's room at a calibration, without working anything out. */
export async function capacityCard(app: App, actor: Actor, id: string, number?: number): Promise<CapacityCard> {
  const calibrated = await calibratedMachine(app, actor, id, number)
  const { calibration, machine } = calibrated
  const newest = await newestCapacity(app.db, id, calibration.number)
  const measured = await newestMeasurement(app, id, calibration.number)
  return {
    calibration: calibration.number,
    qubits: { working: calibration.qubits, made: qubitCount(machine.family) },
    couplers: { working: calibration.couplers, made: couplerCount(machine.family) },
    degrees: degreesOf(calibrated),
    measured,
    newest: newest && newest.id !== measured?.id ? await measuredOf(app, newest) : null,
  }
}
