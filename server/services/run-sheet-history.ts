import type { MadeFromItem, RunSheetView } from '../../shared/schemas/run-sheets'
import type { App } from '../app'
import { jobsOfSubjects } from '../database/repositories/jobs'
import type { ReturnRow, RunSheetRow } from '../database/repositories/run-sheets'
import { personsOf } from '../database/repositories/people'
import { copiesOf, findRunSheet, listRemarks } from '../database/repositories/run-sheets'

/** The run sheet that one was copied from; null where it was prepared anew, or the other was deleted. */
export async function madeFromView(
  app: App,
  { workspaceId, madeFromId }: RunSheetRow,
): Promise<RunSheetView['madeFrom']> {
  const from = madeFromId ? await findRunSheet(app.db, workspaceId, madeFromId) : undefined
  return from ? { id: from.id, number: from.number, name: from.name } : null
}

function lastPieceOf({ schedule }: RunSheetRow['settings']): MadeFromItem['lastPiece'] {
  const [turn, end] = schedule && schedule.length > 2 ? schedule.slice(-2) : []
  return turn && end ? { s: turn.s, microseconds: end.microseconds - turn.microseconds } : null
}

export async function copiesView(app: App, row: RunSheetRow): Promise<MadeFromItem[]> {
  return (await copiesOf(app.db, row)).map(({ id, number, name, state, settings, machineTimeMilliseconds }) => ({
    id,
    number,
    name,
    state,
    annealMicroseconds: settings.annealMicroseconds,
    machineTimeMilliseconds,
    lastPiece: lastPieceOf(settings),
  }))
}

/** Hand-overs and remarks, oldest first. */
export async function remarkViews(app: App, runSheetId: string): Promise<RunSheetView['remarks']> {
  const said = await listRemarks(app.db, runSheetId)
  const people = await personsOf(app.db, [...new Set(said.flatMap(({ remark }) => remark.mentions))])
  return said.map(({ remark, by, forWhom }) => ({
    at: remark.createdAt.toISOString(),
    by,
    for: forWhom,
    what: remark.what,
    text: remark.text,
    mentions: people.filter(({ id }) => remark.mentions.includes(id)),
  }))
}

export async function returnViews(app: App, rows: readonly ReturnRow[]): Promise<RunSheetView['returns']> {
  const jobIds = await jobsOfSubjects(
    app.db,
    rows.map((row) => row.id),
  )
  return rows.map((row) => ({
    id: row.id,
    number: row.number,
    source: row.source,
    byBridge: row.made.byBridge === true,
    status: row.status,
    jobId: jobIds.get(row.id) ?? null,
    reads: row.reads,
    readsWithBreak: row.readsWithBreak,
    best: row.best,
    createdAt: row.createdAt.toISOString(),
  }))
}
