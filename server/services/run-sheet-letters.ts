import type { Person } from '../../shared/schemas/common'
import type { App } from '../app'
import type { Db } from '../database/client'
import { holdersOf } from '../database/repositories/mails'
import { personOf } from '../database/repositories/problems'
import { standInsAt } from '../database/repositories/stand-ins'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { aboutRunSheet } from '../database/repositories/run-sheets'
import type { Letter } from '../mail/letter'
import type { HandedOver, SheetForLetter, SheetReason } from '../mail/letters'
import { handedOverLetter, movedLetter, remarkLetter } from '../mail/letters'
import type { Told } from './mail'
import { tell } from './mail'

/** Everyone who may review this run sheet now, in the place of somebody away too: nobody reviews their own. */
async function reviewersOf(app: App, tx: Db, { workspaceId, preparedBy }: RunSheetRow): Promise<string[]> {
  const standIns = await standInsAt(tx, workspaceId, app.now())
  const meanwhile = standIns.filter(({ forWhom }) => forWhom.id !== preparedBy).map(({ by }) => by.id)
  const all = new Set([...(await holdersOf(tx, workspaceId, 'reviewer')), ...meanwhile])
  return [...all].filter((id) => id !== preparedBy)
}

async function concerned(app: App, tx: Db, row: RunSheetRow, step: HandedOver): Promise<Map<string, SheetReason>> {
  if (step === 'submitted') return new Map((await reviewersOf(app, tx, row)).map((id) => [id, 'reviewer']))
  const told = new Map<string, SheetReason>()
  if (step === 'issued' && row.reviewedBy) told.set(row.reviewedBy, 'approver')
  return told.set(row.preparedBy, 'preparer')
}

interface HandOverTold {
  step: HandedOver
  by: string
  forWhom: Person | null
  remark: string
  mentioned: readonly string[]
}

/**
 * Tells those concerned of a hand-over: reviewers of a submission, the preparer of an approval and of a return, preparer
 * and reviewer of an issue; and whom its remark mentions. Nobody is told twice: the hand-over says more.
 */
export async function tellHandOver(
  app: App,
  tx: Db,
  row: RunSheetRow,
  { step, by, forWhom, remark, mentioned }: HandOverTold,
): Promise<void> {
  const sheet = await sheetForLetter(tx, row)
  const person = await personOf(tx, by)
  const name = forWhom ? `${person.name}, for ${forWhom.name},` : person.name
  const told = await concerned(app, tx, row, step)
  const letters = new Map<string, Told>()
  for (const id of mentioned) letters.set(id, remarkLetter(sheet, name, remark, 'mentioned'))
  for (const [id, reason] of told) {
    const letter = handedOverLetter(sheet, step, name, remark, reason)
    letters.set(id, mentioned.includes(id) ? [letter, remarkLetter(sheet, name, remark, 'mentioned')] : letter)
  }
  await tell(app, tx, { workspaceId: row.workspaceId, by }, letters)
}

/** Tells preparer and reviewers that a repair took a run sheet back to review. */
export async function tellMoved(
  app: App,
  tx: Db,
  row: RunSheetRow,
  { moved, by }: { moved: string; by: string },
): Promise<void> {
  const sheet = await sheetForLetter(tx, row)
  const letters = new Map<string, Letter>()
  for (const id of await reviewersOf(app, tx, row)) letters.set(id, movedLetter(sheet, moved, row.state, 'reviewer'))
  letters.set(row.preparedBy, movedLetter(sheet, moved, row.state, 'preparer'))
  await tell(app, tx, { workspaceId: row.workspaceId, by }, letters)
}

/**
 * Tells those whom a remark mentions, and preparer and reviewer; while nobody has reviewed what is in review, everyone who
 * may. Nobody is told twice: who wants no mentions but remarks on their run sheets is told of it as of any other.
 */
export async function tellRemark(
  app: App,
  tx: Db,
  row: RunSheetRow,
  { by, remark, mentioned }: { by: string; remark: string; mentioned: readonly string[] },
): Promise<void> {
  const told = new Map<string, SheetReason>()
  if (row.reviewedBy) told.set(row.reviewedBy, 'approver')
  else if (row.state === 'in review') for (const id of await reviewersOf(app, tx, row)) told.set(id, 'reviewer')
  told.set(row.preparedBy, 'preparer')
  const sheet = await sheetForLetter(tx, row)
  const { name } = await personOf(tx, by)
  const letters = new Map<string, Told>()
  for (const [id, reason] of told) letters.set(id, remarkLetter(sheet, name, remark, reason))
  for (const id of mentioned) {
    const other = told.get(id)
    const letter = remarkLetter(sheet, name, remark, 'mentioned')
    letters.set(id, other ? [letter, remarkLetter(sheet, name, remark, other)] : letter)
  }
  await tell(app, tx, { workspaceId: row.workspaceId, by }, letters)
}

/** What a letter says of a run sheet. */
export async function sheetForLetter(tx: Db, { id, number, name }: RunSheetRow): Promise<SheetForLetter> {
  return { id, number, name, ...(await aboutRunSheet(tx, id)) }
}
