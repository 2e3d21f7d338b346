import { degreeOf } from '../../shared/engine/graph/graph'
import { applyDefects } from '../../shared/engine/machine/defects'
import { couplerCount, familyName, qubitCount } from '../../shared/engine/machine/family'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type {
  Calibrate,
  CalibrationItem,
  CalibrationSaved,
  MachineItem,
  MachineView,
} from '../../shared/schemas/machines'
import { sheetDifference } from '../../shared/sheet-difference'
import type { Actor, App } from '../app'
import type { MachineRow } from '../database/repositories/machines'
import {
  advanceCalibration,
  countEmbeddingsOn,
  findCalibration,
  listBrokenEmbeddings,
  listCalibrations,
  listMachines,
} from '../database/repositories/machines'
import { pageOf, positionOf } from '../database/repositories/pages'
import { CalibrationReview, tellBroken } from './broken-embeddings'
import { calibratedMachine } from './machine-graphs'
import { untilSaved } from './overtaken'
import { checkedSheet, saveCalibration } from './saved-calibrations'

/**
 * Saves a changed sheet as the next calibration, answers which embeddings and run sheets it breaks, and tells those who
 * made them. Embeddings found while it is worked out are judged too before anything is saved.
 */
export async function calibrateMachine(
  app: App,
  actor: Actor,
  id: string,
  change: Calibrate,
): Promise<CalibrationSaved> {
  const before = await calibratedMachine(app, actor, id)
  const given = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined))
  const sheet = checkedSheet(before.fabric, { ...before.sheet, ...given })
  const working = applyDefects(before.fabric, sheet.defects)
  const number = before.machine.calibration + 1
  const review = new CalibrationReview(app, id, working, before.fabric.ids)
  const { figures, broken } = await untilSaved(
    () => review.judgeAll(),
    () =>
      app.db.transaction(async (tx) => {
        if (!(await advanceCalibration(tx, id, number - 1, app.now())))
          throw new DomainError(
            'wrong state',
            'calibration.raced',
            'Somebody saved another calibration meanwhile. Reload the page and apply your change to it.',
          )
        const figures = await saveCalibration(app, tx, actor, { machineId: id, number, sheet, working })
        const broken = await review.store(tx, number)
        await tellBroken(app, tx, before.machine, number, broken)
        return { figures, broken }
      }),
  )
  return {
    calibration: number,
    ...figures,
    invalidated: {
      embeddings: broken.map(({ embedding, problem }) => ({ id: embedding.id, number: embedding.number, problem })),
      runSheets: broken.flatMap(({ runSheets }) => runSheets.map((row) => ({ id: row.id, number: row.number }))),
    },
  }
}

function itemOf(machine: MachineRow, figures: { qubits: number; couplers: number }, embeddings: number): MachineItem {
  return {
    id: machine.id,
    name: machine.name,
    family: familyName(machine.family),
    calibration: machine.calibration,
    qubits: figures.qubits,
    qubitsMade: qubitCount(machine.family),
    couplers: figures.couplers,
    couplersMade: couplerCount(machine.family),
    embeddings,
    changedAt: machine.changedAt.toISOString(),
  }
}

export async function machinesOf(app: App, actor: Actor, query: PageQuery): Promise<Page<MachineItem>> {
  const position = positionOf(query.cursor)
  const rows = await listMachines(app.db, actor.workspaceId, query.limit + 1, position)
  const items: MachineItem[] = []
  for (const row of rows) items.push(itemOf(row.machine, row, await countEmbeddingsOn(app.db, row.machine.id)))
  return pageOf(items, query.limit, position)
}

/** A machine at a calibration; without a number, at the one in force. */
export async function machineView(app: App, actor: Actor, id: string, number?: number): Promise<MachineView> {
  const { machine, calibration, sheet, graph } = await calibratedMachine(app, actor, id, number)
  const earlier = await findCalibration(app.db, id, calibration.number - 1)
  const calibrations = await calibrationItems(app, machine)
  let maxDegree = 0
  for (let v = 0; v < graph.order; v++) maxDegree = Math.max(maxDegree, degreeOf(graph, v))
  return {
    ...itemOf(machine, calibration, await countEmbeddingsOn(app.db, id)),
    note: machine.note,
    familySizes: machine.family,
    maxDegree,
    shown: calibration.number,
    sheet,
    changes: earlier ? sheetDifference(earlier.sheet, sheet) : null,
    calibrations,
  }
}

/** Every calibration, newest first, with the embeddings that it broke. */
async function calibrationItems(app: App, machine: MachineRow): Promise<CalibrationItem[]> {
  const broken = await listBrokenEmbeddings(app.db, machine.id)
  return (await listCalibrations(app.db, machine.id)).map(({ qubits, couplers, createdAt, ...item }) => ({
    ...item,
    missingQubits: qubitCount(machine.family) - qubits,
    missingCouplers: couplerCount(machine.family) - couplers,
    savedAt: createdAt.toISOString(),
    broke: broken
      .filter(({ broken }) => broken.calibration === item.number)
      .map(({ embedding, problem }) => ({ id: embedding.id, number: embedding.number, problem: problem.name })),
  }))
}
