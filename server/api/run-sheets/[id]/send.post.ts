import { sendByBridge } from '../../../services/bridge-calls'

/**
 * Sends an issued run sheet to the bridge of its machine, for the first time or again where that came to nothing: 202. 409
 * while it is on its way, and where the machine has no bridge that is on.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  await sendByBridge(app, actor, partOf(event, 'id'))
  setResponseStatus(event, 202)
  return { ok: true }
})
