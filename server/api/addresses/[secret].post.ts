import { confirmAddress } from '../../services/own-account'

/** Changes the address of an account to the one that the link was sent to, once; the one before is told. */
export default definePublicRoute(async (event, app) => {
  await confirmAddress(app, partOf(event, 'secret'))
  return { ok: true }
})
