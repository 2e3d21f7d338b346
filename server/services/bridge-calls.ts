import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import { OutboundRefused } from '../bridge/outbound'
import type { Db } from '../database/client'
import type { BridgeCallRow } from '../database/repositories/bridge-calls'
import { findCallOf, insertCall, updateCall } from '../database/repositories/bridge-calls'
import type { BridgeRow } from '../database/repositories/bridges'
import { findBridge } from '../database/repositories/bridges'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { resendableFrom } from './bridge-call-views'
import { bundleOf } from './bundle'
import { embeddingRow } from './embedding-subject'
import { machineRow } from './machine-graphs'
import { handOver } from './review'
import { runSheetRow } from './run-sheets'

/** A run sheet ready to go to the bridge of its machine. */
export interface SheetToSend {
  sheet: RunSheetRow
  machine: { name: string }
  bridge: BridgeRow
  bundle: { fileName: string; bytes: Uint8Array }
}

/** The machine of a run sheet, and its bridge where that is on. */
async function bridgeOf(app: App, actor: Pick<Actor, 'workspaceId'>, sheet: RunSheetRow) {
  const { machineId } = await embeddingRow(app, { userId: '', ...actor }, sheet.embeddingId)
  const machine = await machineRow(app, actor, machineId)
  const bridge = await findBridge(app.db, actor.workspaceId, machineId)
  return { machine, bridge: bridge?.isOn ? bridge : undefined }
}

async function requireBridge(app: App, actor: Actor, sheet: RunSheetRow): Promise<BridgeRow> {
  const { machine, bridge } = await bridgeOf(app, actor, sheet)
  if (bridge) return bridge
  throw new DomainError(
    'wrong state',
    'bridge.off',
    `${machine.name} has no bridge that is on. Hand on the bundle, or ask a steward to set one up.`,
  )
}

/**
 * What goes to the bridge.
 * @throws OutboundRefused where it cannot be sent, now or later
 */
export async function sheetToSend(app: App, call: BridgeCallRow): Promise<SheetToSend> {
  const actor = { userId: call.createdBy, workspaceId: call.workspaceId }
  try {
    const sheet = await runSheetRow(app, actor, call.runSheetId)
    if (sheet.state !== 'issued') throw new OutboundRefused(`RS-${sheet.number} is ${sheet.state}`)
    const { machine } = await bridgeOf(app, actor, sheet)
    const bridge = await requireBridge(app, actor, sheet)
    return { sheet, machine, bridge, bundle: await bundleOf(app, actor, sheet.id) }
  } catch (error) {
    throw error instanceof DomainError ? new OutboundRefused(error.message) : error
  }
}

const newCall = (app: App, actor: Actor, runSheetId: string, { kind }: BridgeRow) => ({
  ...{ id: randomUUID(), workspaceId: actor.workspaceId, runSheetId, kind, state: 'waiting' as const },
  ...{ nextAttemptAt: app.now(), createdBy: actor.userId, createdAt: app.now() },
})

/** Issues an approved run sheet; by the bridge of its machine where that is asked for. */
export async function issueRunSheet(
  app: App,
  actor: Actor,
  id: string,
  { remark, byBridge }: { remark: string; byBridge: boolean },
): Promise<{ state: RunSheetRow['state'] }> {
  if (!byBridge) return handOver(app, actor, id, 'issue', remark)
  const bridge = await requireBridge(app, actor, await runSheetRow(app, actor, id))
  const send = (tx: Db): Promise<void> => insertCall(tx, newCall(app, actor, id, bridge))
  return handOver(app, actor, id, 'issue', remark, send)
}

/**
 * Sends an issued run sheet to the bridge of its machine: for the first time, or again where that came to nothing.
 * @throws DomainError wrong state, where it is not issued, is on its way, or there is no bridge
 */
export async function sendByBridge(app: App, actor: Actor, id: string): Promise<void> {
  const sheet = await runSheetRow(app, actor, id)
  if (sheet.state !== 'issued')
    throw new DomainError(
      'wrong state',
      'bridge-call.state',
      `RS-${sheet.number} is ${sheet.state}; a bridge is sent what is issued and not returned yet.`,
    )
  const bridge = await requireBridge(app, actor, sheet)
  const call = await findCallOf(app.db, id)
  if (!call) return insertCall(app.db, newCall(app, actor, id, bridge))
  const sent = await updateCall(app.db, call.id, resendableFrom(call, app.now()), {
    ...{ state: 'waiting', nextAttemptAt: app.now(), earlierAttempts: call.attempts },
    ...{ returnId: null, returnedDigest: null, refusal: null, createdBy: actor.userId },
  })
  if (!sent)
    throw new DomainError(
      'wrong state',
      'bridge-call.open',
      `RS-${sheet.number} is on its way already. It can be sent again when that has come to nothing.`,
    )
}
