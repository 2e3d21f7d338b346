import type { App } from '../app'
import type { BridgeRow } from '../database/repositories/bridges'
import type { OutboundAnswer } from './outbound'
import { rehearsalBridge } from './rehearsal-bridge'
import { signatureHeaders } from './signature'

/** Sends a signed call to a bridge. @throws as `Outbound.post` */
export function callBridge(app: App, bridge: BridgeRow, callId: string, body: string): Promise<OutboundAnswer> {
  const headers = {
    'content-type': 'application/json',
    'user-agent': `Espalier/${app.version}`,
    'espalier-call': callId,
    ...signatureHeaders(bridge.keys, app.now(), body),
  }
  return bridge.url === null ? rehearsalBridge(app, body) : app.outbound.post(bridge.url, headers, body)
}
