import { machineBridge } from '../../../../services/bridges'

/** The bridge of a machine: where its run sheets can be sent, the secrets that sign, and the last test call. */
export default defineRoute(['steward', 'owner'], async (event, { app, ...actor }) =>
  machineBridge(app, actor, partOf(event, 'id')),
)
