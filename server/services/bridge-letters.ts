import type { App } from '../app'
import type { Db } from '../database/client'
import type { BridgeCallRow } from '../database/repositories/bridge-calls'
import { holdersOf } from '../database/repositories/mails'
import { findRunSheet } from '../database/repositories/run-sheets'
import { bridgeLetter } from '../mail/bridge-letters'
import type { CallTold } from '../mail/bridge-letters'
import { tell } from './mail'
import { sheetForLetter } from './run-sheet-letters'

/** Tells whoever sent a run sheet, and where it was not taken the owners too, what came of it. */
export async function tellOfCall(app: App, tx: Db, call: BridgeCallRow, told: CallTold): Promise<void> {
  const { workspaceId, createdBy } = call
  const row = await findRunSheet(tx, workspaceId, call.runSheetId)
  if (!row) return
  const sheet = await sheetForLetter(tx, row)
  const owners = told.what === 'given up' ? await holdersOf(tx, workspaceId, 'owner') : []
  const letters = new Map(owners.map((id) => [id, bridgeLetter(sheet, told, 'owner')]))
  letters.set(createdBy, bridgeLetter(sheet, told, 'sender'))
  await tell(app, tx, { workspaceId, by: null }, letters)
}
