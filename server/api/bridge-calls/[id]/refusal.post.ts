import { refuseRunSchema } from '../../../../shared/schemas/bridges'
import { callOfToken, takeRefusal } from '../../../services/bridge-returns'

/**
 * Where a bridge says that the machine does not run what it was sent, and why, with the token of its call as bearer: the
 * run sheet shows it. 409 where samples came before.
 */
export default definePublicRoute(async (event, app) => {
  const call = await callOfToken(app, partOf(event, 'id'), bearerOf(event))
  await takeRefusal(app, call, (await bodyOf(event, refuseRunSchema)).reason)
  return { ok: true }
})
