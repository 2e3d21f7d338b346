import { applyDefects } from '../../shared/engine/machine/defects'
import { buildFabric } from '../../shared/engine/machine/build-fabric'
import type { Fabric, PublishedFamily, WorkingGraph } from '../../shared/engine/machine/fabric'
import { qubitCount } from '../../shared/engine/machine/family'
import { indexById } from '../../shared/engine/machine/index-of'
import { DomainError } from '../../shared/errors'
import type { MachineSheet } from '../../shared/schemas/machines'
import type { Actor, App } from '../app'
import type { CalibrationRow, MachineRow } from '../database/repositories/machines'
import { findCalibration, findMachine } from '../database/repositories/machines'
import { unpackFabric } from './custom-graphs'
import { Recent } from './recent'

const fabrics = new Recent<Promise<Fabric>>(8)
/** Calibrations never change, so what was worked out from one can be kept. */
const workings = new Recent<WorkingGraph>(8)

/** Fabrics of more qubits are built in a thread: the largest take a third of a second. */
const MOST_QUBITS_BUILT_HERE = 10_000

/** The fabric of a family; the last few are kept. */
export const fabricOf = (app: App, family: PublishedFamily): Promise<Fabric> =>
  keptFabric(JSON.stringify(family), async () =>
    qubitCount(family) > MOST_QUBITS_BUILT_HERE ? app.compute.run('makeFabric', { family }) : buildFabric(family),
  )

/** The graph that a machine was made as: built from its family, or loaded where it was uploaded. */
export async function fabricOfMachine(app: App, { family, graphBlobId }: MachineRow): Promise<Fabric> {
  if (family.kind !== 'custom') return fabricOf(app, family)
  if (!graphBlobId) throw new Error('a machine of no family has no graph')
  return keptFabric(graphBlobId, async () => unpackFabric(family, await app.blobs.read(graphBlobId)))
}

/** What failed is not kept. */
async function keptFabric(key: string, make: () => Promise<Fabric>): Promise<Fabric> {
  const coming = fabrics.get(key, make)
  try {
    return await coming
  } catch (error) {
    fabrics.drop(key, coming)
    throw error
  }
}

/** A machine as it worked at one calibration. */
export interface CalibratedMachine extends WorkingGraph {
  machine: MachineRow
  calibration: CalibrationRow
  sheet: MachineSheet
  fabric: Fabric
  /** Dense index of a published qubit number, −1 when the family has none. */
  indexOf: (id: number) => number
}

/** A machine of the workspace. @throws DomainError not found, also for another workspace's */
export async function machineRow(app: App, actor: Pick<Actor, 'workspaceId'>, id: string): Promise<MachineRow> {
  const row = await findMachine(app.db, actor.workspaceId, id)
  if (!row) throw new DomainError('not found', 'machine.unknown', 'There is no such machine in this workspace.')
  return row
}

/** A machine at a calibration; without a number, at the one in force. */
export async function calibratedMachine(
  app: App,
  actor: Pick<Actor, 'workspaceId'>,
  machineId: string,
  number?: number,
): Promise<CalibratedMachine> {
  const machine = await machineRow(app, actor, machineId)
  const calibration = await findCalibration(app.db, machineId, number ?? machine.calibration)
  if (!calibration)
    throw new DomainError(
      'not found',
      'calibration.unknown',
      `${machine.name} has no calibration ${number}; the one in force is ${machine.calibration}.`,
    )
  const fabric = await fabricOfMachine(app, machine)
  const working = workings.get(`${machineId} ${calibration.number}`, () =>
    applyDefects(fabric, calibration.sheet.defects),
  )
  return { machine, calibration, sheet: calibration.sheet, fabric, indexOf: indexById(fabric), ...working }
}
