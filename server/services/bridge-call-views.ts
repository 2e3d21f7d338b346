import type { BridgeCallState, BridgeCallView, SheetBridge } from '../../shared/schemas/bridges'
import type { App } from '../app'
import type { BridgeCallRow } from '../database/repositories/bridge-calls'
import { findCallOf } from '../database/repositories/bridge-calls'
import { findBridge } from '../database/repositories/bridges'
import type { RunSheetRow } from '../database/repositories/run-sheets'

/** States from which a call may be sent anew. */
export function resendableFrom({ kind, state, tokenExpiresAt }: BridgeCallRow, now: Date): BridgeCallState[] {
  const isOver =
    state === 'given up' ||
    state === 'refused' ||
    (state === 'returned' && kind === 'rehearsal') ||
    (state === 'taken' && tokenExpiresAt !== null && tokenExpiresAt <= now)
  return isOver ? [state] : []
}

/** What a run sheet can be issued by; null where its machine has no bridge that is on. */
export async function sheetBridge(app: App, sheet: RunSheetRow, machineId: string): Promise<SheetBridge | null> {
  const bridge = await findBridge(app.db, sheet.workspaceId, machineId)
  if (!bridge?.isOn) return null
  return { kind: bridge.kind, host: bridge.url === null ? null : new URL(bridge.url).host }
}

/** How far a run sheet is on its way; null where it was not sent to a bridge. */
export async function bridgeCallView(app: App, { id, state }: RunSheetRow): Promise<BridgeCallView | null> {
  const call = await findCallOf(app.db, id)
  if (!call) return null
  return {
    kind: call.kind,
    state: call.state,
    tries: [...call.tries].reverse(),
    nextAttemptAt: call.nextAttemptAt?.toISOString() ?? null,
    tokenExpiresAt: call.tokenExpiresAt?.toISOString() ?? null,
    refusal: call.refusal,
    returnId: call.returnId,
    isResendable: state === 'issued' && resendableFrom(call, app.now()).length > 0,
  }
}
