import { takeBackStandIn } from '../../services/stand-ins'

/** Takes reviews back that were handed over, from now on; 403 for those of others, but by an owner. */
export default defineSessionRoute(['reviewer', 'owner'], async (event, { app, ...asking }) => {
  await takeBackStandIn(app, asking, partOf(event, 'id'))
  return { ok: true }
})
