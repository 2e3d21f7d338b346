import { randomUUID } from 'node:crypto'
import { groupDigits } from '../../shared/engine/digits'
import { MOVABLE_STATES } from '../../shared/schemas/run-sheets'
import type { App } from '../app'
import type { Db } from '../database/client'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { findEmbeddingOfJob, markChosen } from '../database/repositories/embeddings'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { insertRemark, lockRunSheetsOn, updateRunSheet } from '../database/repositories/run-sheets'
import { releaseTime } from './budget'
import type { Subject } from './embedding-subject'
import { tellMoved } from './run-sheet-letters'
import { estimate } from './run-sheet-time'

/**
 * Puts a repaired embedding in the place of the one it began from, in the transaction that stores it: it takes over the
 * mark of the chosen one, and the run sheets that were not issued move to it. What was approved or in review is in review
 * afterwards, without reviewer and fingerprint: other qubits would be programmed than those that were agreed to.
 * @param by who asked for the repair
 */
export async function takePlace(app: App, tx: Db, row: EmbeddingRow, subject: Subject, by: string): Promise<void> {
  const start = row.startId ? await findEmbeddingOfJob(tx, row.startId) : undefined
  if (!start) return
  if (start.chosen) await markChosen(tx, row, true)
  const changed = `${groupDigits(row.changedChains ?? 0)} of ${groupDigits(subject.labels.length)} chains changed`
  const moved = `moved from E-${start.number} to E-${row.number}, repaired for calibration ${row.calibration}: ${changed}`
  for (const sheet of await lockRunSheetsOn(tx, start.id, MOVABLE_STATES))
    await moveSheet(app, tx, sheet, { row, subject, moved, by })
}

interface Move {
  row: EmbeddingRow
  subject: Subject
  moved: string
  by: string
}

async function moveSheet(app: App, tx: Db, sheet: RunSheetRow, { row, subject, moved, by }: Move): Promise<void> {
  const wasAgreed = sheet.state === 'approved' || sheet.state === 'in review'
  await updateRunSheet(tx, sheet.id, MOVABLE_STATES, {
    embeddingId: row.id,
    machineTimeMilliseconds: estimate(subject, sheet.settings).totalMicroseconds / 1000,
    changedAt: app.now(),
    ...(wasAgreed ? { state: 'in review', fingerprint: null, reviewedBy: null } : {}),
  })
  await insertRemark(tx, {
    id: randomUUID(),
    runSheetId: sheet.id,
    by,
    what: sheet.state === 'approved' ? 'back in review' : 'on a repaired embedding',
    text: moved,
    createdAt: app.now(),
  })
  if (sheet.state === 'approved') await releaseTime(app, tx, sheet, { by, remark: 'back in review' })
  if (wasAgreed) await tellMoved(app, tx, sheet, { moved, by })
}
