import { saveBridgeSchema } from '../../../../../shared/schemas/bridges'
import { saveBridge } from '../../../../services/bridges'

/**
 * Sets up or changes the bridge of a machine: the team's own at an address, or the built-in one that rehearses. `{made}`:
 * the secret that was made with a new one of the team's, shown this once, else null.
 */
export default defineSessionRoute(['steward', 'owner'], async (event, { app, ...actor }) =>
  saveBridge(app, actor, partOf(event, 'id'), await bodyOf(event, saveBridgeSchema)),
)
