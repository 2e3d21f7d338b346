import { randomUUID } from 'node:crypto'
import { degreeOf, sizeOf } from '../../shared/engine/graph/graph'
import { applyDefects, defectIssues, normaliseDefects } from '../../shared/engine/machine/defects'
import type { Fabric, WorkingGraph } from '../../shared/engine/machine/fabric'
import { couplerCount, familyName, familyProblems, qubitCount } from '../../shared/engine/machine/family'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type {
  Calibrate,
  CalibrationItem,
  CalibrationSaved,
  CreateMachine,
  MachineItem,
  MachineSheet,
  MachineView,
} from '../../shared/schemas/machines'
import { sheetDifference } from '../../shared/sheet-difference'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { MachineRow } from '../database/repositories/machines'
import {
  advanceCalibration,
  countEmbeddingsOn,
  findCalibration,
  insertCalibration,
  listBrokenEmbeddings,
  insertMachine,
  listCalibrations,
  listMachines,
  machineNameTaken,
} from '../database/repositories/machines'
import { pageOf, positionOf } from '../database/repositories/pages'
import { CalibrationReview, tellBroken } from './broken-embeddings'
import { calibratedMachine, fabricOf } from './machine-graphs'
import { untilSaved } from './overtaken'

/** Checks a defect list against the family and brings it into order. @throws DomainError naming each unknown part */
function checkedSheet(fabric: Fabric, sheet: MachineSheet): MachineSheet {
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

interface NewCalibration {
  machineId: string
  number: number
  sheet: MachineSheet
  working: WorkingGraph
}

async function saveCalibration(app: App, tx: Db, actor: Actor, { working, ...calibration }: NewCalibration) {
  const figures = { qubits: workingQubits(working), couplers: sizeOf(working.graph) }
  await insertCalibration(tx, { ...calibration, ...figures, createdBy: actor.userId, createdAt: app.now() })
  return figures
}

/** Adds a machine with its first calibration. */
export async function createMachine(app: App, actor: Actor, input: CreateMachine) {
  const { name, note, family, ...given } = input
  const problems = familyProblems(family)
  if (problems.length > 0)
    throw new DomainError(
      'not acceptable',
      'machine.family',
      problems.join('; '),
      problems.map((message) => ({ path: 'family', message })),
    )
  const fabric = fabricOf(family)
  const sheet = checkedSheet(fabric, given)
  const working = applyDefects(fabric, sheet.defects)
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
    await insertMachine(tx, {
      id,
      workspaceId: actor.workspaceId,
      name,
      note,
      family,
      calibration: 1,
      createdBy: actor.userId,
      createdAt: now,
      changedAt: now,
    })
    const figures = await saveCalibration(app, tx, actor, { machineId: id, number: 1, sheet, working })
    return { id, ...figures, calibration: 1 }
  })
}

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
