import { DomainError } from '../../shared/errors'
import type { CalibrationComparison, ComparedCalibration, MachineSheet } from '../../shared/schemas/machines'
import { differenceCsv, sheetDifference } from '../../shared/sheet-difference'
import type { Actor, App } from '../app'
import type { MachineRow } from '../database/repositories/machines'
import { findSavedCalibration } from '../database/repositories/machines'
import { machineRow } from './machine-graphs'

interface Side {
  shown: ComparedCalibration
  sheet: MachineSheet
}

async function sideOf(app: App, machine: MachineRow, number: number): Promise<Side> {
  const found = await findSavedCalibration(app.db, machine.id, number)
  if (!found)
    throw new DomainError(
      'not found',
      'calibration.unknown',
      `${machine.name} has no calibration ${number}; the one in force is ${machine.calibration}.`,
    )
  const { calibration, savedBy } = found
  const { sheet, qubits, couplers, createdAt } = calibration
  return {
    sheet,
    shown: {
      number,
      savedBy,
      savedAt: createdAt.toISOString(),
      remark: sheet.remark,
      qubits,
      couplers,
      temperatureMillikelvin: sheet.temperatureMillikelvin,
      energyTable: sheet.energyTable,
    },
  }
}

/** What differs between two calibrations of a machine, either of which may be the later one. */
export async function compareCalibrations(
  app: App,
  actor: Actor,
  id: string,
  numbers: { from: number; to: number },
): Promise<CalibrationComparison> {
  const machine = await machineRow(app, actor, id)
  const from = await sideOf(app, machine, numbers.from)
  const to = await sideOf(app, machine, numbers.to)
  return {
    machine: { id, name: machine.name, calibration: machine.calibration },
    from: from.shown,
    to: to.shown,
    difference: sheetDifference(from.sheet, to.sheet),
  }
}

/** The same as a file, one changed part or figure a line. */
export function comparisonFile({ machine, from, to, difference }: CalibrationComparison) {
  return {
    fileName: `${machine.name} calibrations ${from.number} and ${to.number}.csv`,
    text: differenceCsv(difference),
  }
}
