import { randomUUID } from 'node:crypto'
import { applyDefects } from '../../shared/engine/machine/defects'
import type { Fabric } from '../../shared/engine/machine/fabric'
import { familyProblems } from '../../shared/engine/machine/family'
import { DomainError } from '../../shared/errors'
import type { CreateMachine } from '../../shared/schemas/machines'
import type { Actor, App } from '../app'
import { insertMachine, machineNameTaken } from '../database/repositories/machines'
import { fabricOf } from './machine-graphs'
import { checkedSheet, saveCalibration } from './saved-calibrations'

/** What is said of a new machine beside its graph. */
export type NewMachine = Omit<CreateMachine, 'family'>

export interface CreatedMachine {
  id: string
  qubits: number
  couplers: number
  calibration: number
}

/** Adds a machine of a family with its first calibration. @throws DomainError naming what does not fit */
export async function createMachine(
  app: App,
  actor: Actor,
  { family, ...input }: CreateMachine,
): Promise<CreatedMachine> {
  const problems = familyProblems(family)
  if (problems.length > 0)
    throw new DomainError(
      'not acceptable',
      'machine.family',
      problems.join('; '),
      problems.map((message) => ({ path: 'family', message })),
    )
  return addMachine(app, actor, input, await fabricOf(app, family), null)
}

/**
 * Adds a machine with its first calibration.
 * @param packed the graph as it is stored, of a machine of no family
 */
export async function addMachine(
  app: App,
  actor: Actor,
  { name, note, ...given }: NewMachine,
  fabric: Fabric,
  packed: Uint8Array | null,
): Promise<CreatedMachine> {
  const sheet = checkedSheet(fabric, given)
  const working = applyDefects(fabric, sheet.defects)
  const graphBlobId = packed && (await app.blobs.write(packed))
  const id = randomUUID()
  const now = app.now()
  return app.db.transaction(async (tx) => {
    if (await machineNameTaken(tx, actor.workspaceId, name))
      throw new DomainError(
        'not acceptable',
        'machine.name',
        `There is a machine called ${name} already. Choose another name.`,
        [{ path: 'name', message: 'taken' }],
      )
    if (graphBlobId) await app.blobs.adopt(tx, graphBlobId)
    await insertMachine(tx, {
      id,
      workspaceId: actor.workspaceId,
      name,
      note,
      family: fabric.family,
      graphBlobId,
      calibration: 1,
      createdBy: actor.userId,
      createdAt: now,
      changedAt: now,
    })
    const figures = await saveCalibration(app, tx, actor, { machineId: id, number: 1, sheet, working })
    return { id, ...figures, calibration: 1 }
  })
}
