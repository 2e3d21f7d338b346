import { testBridge } from '../../../../services/bridges'

/** Sends a signed call that only tries the bridge, and says what came back: a refusal is an answer too. 409 without a bridge. */
export default defineRoute(['steward', 'owner'], async (event, { app, ...actor }) =>
  testBridge(app, actor, partOf(event, 'id')),
)
