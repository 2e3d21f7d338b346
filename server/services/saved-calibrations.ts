import { sizeOf } from '../../shared/engine/graph/graph'
import { defectIssues, normaliseDefects } from '../../shared/engine/machine/defects'
import type { Fabric, WorkingGraph } from '../../shared/engine/machine/fabric'
import { familyName } from '../../shared/engine/machine/family'
import { DomainError } from '../../shared/errors'
import type { MachineSheet } from '../../shared/schemas/machines'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { insertCalibration } from '../database/repositories/machines'

/** Checks a defect list against the family and brings it into order. @throws DomainError naming each unknown part */
export function checkedSheet(fabric: Fabric, sheet: MachineSheet): MachineSheet {
  const issues = defectIssues(fabric, sheet.defects)
  if (issues.length > 0)
    throw new DomainError(
      'not acceptable',
      'machine.defects',
      `${issues.length} of the defects ${issues.length === 1 ? 'does' : 'do'} not fit ${familyName(fabric.family)}: ${issues[0]!.message}.`,
      issues.slice(0, 100).map(({ path, message }) => ({ path: `defects.${path}`, message })),
    )
  const { qubits, couplers } = normaliseDefects(fabric, sheet.defects)
  return { ...sheet, defects: { qubits: [...qubits], couplers: couplers.map(([a, b]) => [a, b]) } }
}

const workingQubits = (working: WorkingGraph): number => working.usable.reduce((sum, one) => sum + one, 0)

export interface NewCalibration {
  machineId: string
  number: number
  sheet: MachineSheet
  working: WorkingGraph
}

/** Stores a calibration with what works at it. */
export async function saveCalibration(app: App, tx: Db, actor: Actor, { working, ...calibration }: NewCalibration) {
  const figures = { qubits: workingQubits(working), couplers: sizeOf(working.graph) }
  await insertCalibration(tx, { ...calibration, ...figures, createdBy: actor.userId, createdAt: app.now() })
  return figures
}
