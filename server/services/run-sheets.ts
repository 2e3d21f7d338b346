import { randomUUID } from 'node:crypto'
import type { z } from 'zod'
import { durationOf } from '../../shared/engine/programming/schedule'
import { referenceSize } from '../../shared/engine/programming/strength'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { DeletionView } from '../../shared/schemas/deletions'
import type {
  createRunSheetSchema,
  EditRunSheet,
  RunSheetItem,
  RunSheetSettings,
  RunSheetView,
} from '../../shared/schemas/run-sheets'
import { EDITABLE_STATES, OPEN_STATES } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { nextNumber } from '../database/repositories/counters'
import { pageOf, positionOf } from '../database/repositories/pages'
import { personOf } from '../database/repositories/problems'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import {
  findRunSheet,
  insertRunSheet,
  listRunSheets,
  returnsOfRunSheets,
  updateRunSheet,
} from '../database/repositories/run-sheets'
import { bridgeCallView, sheetBridge } from './bridge-call-views'
import { budgetLeft } from './budget'
import { deleteFor } from './deletions'
import { brokenView } from './broken-view'
import { embeddingRow } from './embedding-subject'
import { machineRow } from './machine-graphs'
import { standingOf } from './problem-difference'
import type { Bench } from './programming'
import { rehearsalChoices } from './rehearsal-settings'
import { checksOf } from './run-sheet-checks'
import { fingerprintOf, loadBench, programmeBench, programmeShown, requireProgrammed } from './programming'
import { precisionOf } from './precision'
import { compareRules, isingSizes, scaleLimitOf } from './strength-rules'
import { bestReference } from '../database/repositories/reference-optima'
import { copiesView, madeFromView, remarkViews, returnViews } from './run-sheet-history'
import { estimate, machineTimeView } from './run-sheet-time'

/** A run sheet of the workspace. @throws DomainError not found, also for another workspace's */
export async function runSheetRow(app: App, actor: Actor, id: string): Promise<RunSheetRow> {
  const row = await findRunSheet(app.db, actor.workspaceId, id)
  if (!row) throw new DomainError('not found', 'run-sheet.unknown', 'There is no such run sheet in this workspace.')
  return row
}

/** The embedding of a run sheet or of a return, and everything under it, loaded. */
export async function benchOf(app: App, actor: Actor, row: Pick<RunSheetRow, 'embeddingId'>): Promise<Bench> {
  return loadBench(app, await embeddingRow(app, actor, row.embeddingId))
}

/** A schedule says itself how long an anneal takes. */
export const timed = (settings: RunSheetSettings): RunSheetSettings =>
  settings.schedule ? { ...settings, annealMicroseconds: durationOf(settings.schedule) } : settings

export async function createRunSheet(
  app: App,
  actor: Actor,
  input: z.infer<typeof createRunSheetSchema>,
): Promise<{ id: string; number: number }> {
  const { embeddingId, name, ...asked } = input
  const settings = timed(asked)
  const bench = await loadBench(app, await embeddingRow(app, actor, embeddingId))
  requireProgrammed(programmeBench(bench, settings))
  return app.db.transaction((tx) =>
    insertDraft(app, tx, actor, { bench, name: name ?? bench.problem.name, settings, madeFromId: null }),
  )
}

interface Draft {
  bench: Bench
  name: string
  settings: RunSheetSettings
  /** The run sheet that it is copied from. */
  madeFromId: string | null
}

/** Saves a draft, with the next number. What is programmed must have been found to fit before. */
export async function insertDraft(
  app: App,
  tx: Db,
  actor: Actor,
  { bench, name, settings, madeFromId }: Draft,
): Promise<{ id: string; number: number }> {
  const id = randomUUID()
  const now = app.now()
  const number = await nextNumber(tx, actor.workspaceId, 'run sheet')
  await insertRunSheet(tx, {
    id,
    workspaceId: actor.workspaceId,
    embeddingId: bench.row.id,
    number,
    name,
    state: 'draft',
    settings,
    machineTimeMilliseconds: estimate(bench, settings).totalMicroseconds / 1000,
    preparedBy: actor.userId,
    madeFromId,
    createdAt: now,
    changedAt: now,
  })
  return { id, number }
}

/** Changes a draft; from submission on the settings stand still. */
export async function editRunSheet(app: App, actor: Actor, id: string, edit: EditRunSheet): Promise<void> {
  const row = await runSheetRow(app, actor, id)
  if (!EDITABLE_STATES.includes(row.state)) throw frozen(row)
  const { name, ...changes } = edit
  const given = Object.fromEntries(Object.entries(changes).filter(([, value]) => value !== undefined))
  const settings = timed({ ...row.settings, ...given })
  const bench = await benchOf(app, actor, row)
  requireProgrammed(programmeBench(bench, settings))
  const saved = await updateRunSheet(app.db, id, EDITABLE_STATES, {
    ...(name ? { name } : {}),
    settings,
    machineTimeMilliseconds: estimate(bench, settings).totalMicroseconds / 1000,
    changedAt: app.now(),
  })
  if (!saved) throw frozen(row)
}

const frozen = (row: RunSheetRow): DomainError =>
  new DomainError(
    'wrong state',
    'run-sheet.frozen',
    `RS-${row.number} is ${row.state}; its settings no longer change. Ask the reviewer to send it back, or prepare a new one.`,
  )

/** Deletes a draft with its rehearsals. */
export async function removeRunSheet(app: App, actor: Actor, id: string): Promise<DeletionView> {
  const row = await runSheetRow(app, actor, id)
  if (!EDITABLE_STATES.includes(row.state))
    throw new DomainError(
      'wrong state',
      'run-sheet.kept',
      `RS-${row.number} is ${row.state} and is kept. Only drafts can be deleted.`,
    )
  return deleteFor(app, 'run sheet', id)
}

export async function runSheetsOf(app: App, actor: Actor, query: PageQuery): Promise<Page<RunSheetItem>> {
  const position = positionOf(query.cursor)
  const rows = await listRunSheets(app.db, actor.workspaceId, query.limit + 1, position)
  return pageOf(
    rows.map(({ sheet, ...context }) => itemOf(sheet, context)),
    query.limit,
    position,
  )
}

const itemOf = (
  sheet: RunSheetRow,
  context: Pick<RunSheetItem, 'embedding' | 'machine' | 'problem'>,
): RunSheetItem => ({
  id: sheet.id,
  number: sheet.number,
  name: sheet.name,
  state: sheet.state,
  ...context,
  reads: sheet.settings.reads,
  machineTimeMilliseconds: sheet.machineTimeMilliseconds,
  changedAt: sheet.changedAt.toISOString(),
})

export async function runSheetView(app: App, actor: Actor, id: string): Promise<RunSheetView> {
  const row = await runSheetRow(app, actor, id)
  const bench = await benchOf(app, actor, row)
  const programming = programmeShown(bench, row.settings)
  const programmed = requireProgrammed(programming)
  const { problem, machine } = bench
  const precision = precisionOf(bench, programmed)
  const time = machineTimeView(bench, row.settings)
  const ofVersion = await standingOf(app, problem)
  const broken = await brokenView(app, bench.row)
  const { calibration: inForce } = await machineRow(app, row, machine.machine.id)
  const returned = await returnsOfRunSheets(app.db, [id])
  const budget = await budgetLeft(app, row, machine.machine.id)
  const checks = checksOf({
    bench,
    row,
    programming,
    programmed,
    precision,
    ofVersion,
    embedding: { inForce, broken },
    time,
    budget,
    returned,
    reference: await bestReference(app.db, problem.id, problem.version),
  })
  return {
    ...itemOf(row, {
      problem: { id: problem.id, number: problem.number, name: problem.name },
      embedding: { id: bench.row.id, number: bench.row.number },
      machine: { id: machine.machine.id, name: machine.machine.name },
    }),
    madeFrom: await madeFromView(app, row),
    copies: await copiesView(app, row),
    settings: row.settings,
    ofVersion,
    ...standsOn(bench, row.fingerprint ?? fingerprintOf(programmed)),
    rules: compareRules(bench, row.settings, programming),
    chainTotals: chainTotals(bench),
    scale: programmed.scale,
    limitedBy: programmed.limitedBy,
    scaleLimit: scaleLimitOf(bench, programmed),
    precision,
    anneal: annealView(bench),
    machineTime: time,
    budget,
    rehearsal: rehearsalChoices(programmed, machine.sheet),
    checks,
    bridge: await sheetBridge(app, row, machine.machine.id),
    call: await bridgeCallView(app, row),
    broken: OPEN_STATES.includes(row.state) ? broken : null,
    returns: await returnViews(app, returned),
    remarks: await remarkViews(app, id),
    preparedBy: await personOf(app.db, row.preparedBy),
    reviewedBy: row.reviewedBy ? await personOf(app.db, row.reviewedBy) : null,
    createdAt: row.createdAt.toISOString(),
  }
}

function chainTotals({ embedding: { offsets, qubits } }: Bench): RunSheetView['chainTotals'] {
  let longest = 0
  for (let i = 0; i + 1 < offsets.length; i++) longest = Math.max(longest, offsets[i + 1]! - offsets[i]!)
  return { qubits: qubits.length, longest }
}

const standsOn = (bench: Bench, programmed: string) => ({
  calibration: bench.machine.calibration.number,
  sense: bench.problem.sense,
  fingerprints: { problem: bench.problem.fingerprint, embedding: bench.row.fingerprint ?? '', programmed },
  maxAbsJ: referenceSize(bench.ising),
  ising: isingSizes(bench),
})

function annealView({ machine: { sheet } }: Bench): RunSheetView['anneal'] {
  const { annealMinMicroseconds, annealMaxMicroseconds, slopeMaxPerMicrosecond, schedulePointsMax } = sheet.timing
  const limits = { annealMinMicroseconds, annealMaxMicroseconds, slopeMaxPerMicrosecond, schedulePointsMax }
  return { limits, energyTable: sheet.energyTable, temperatureMillikelvin: sheet.temperatureMillikelvin }
}
