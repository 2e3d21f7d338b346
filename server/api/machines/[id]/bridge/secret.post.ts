import { renewBridgeSecret } from '../../../../services/bridges'

/** Makes a new secret, shown this once: 201 `{keyId, secret}`. For a day calls are signed with the one before it as well. */
export default defineSessionRoute(['steward', 'owner'], async (event, { app, ...actor }) => {
  const made = await renewBridgeSecret(app, actor, partOf(event, 'id'))
  setResponseStatus(event, 201)
  return made
})
