import { removeBridge } from '../../../../services/bridges'

/** Takes the bridge from a machine, and its secrets with it; 409 where there is none. */
export default defineSessionRoute(['steward', 'owner'], async (event, { app, ...actor }) => {
  await removeBridge(app, actor, partOf(event, 'id'))
  return { ok: true }
})
