import { chainsOf } from '../../../services/embedding-chains'

/**
 * The chains of a found embedding as packed arrays (shared/packed-arrays.ts): offsets, qubits and neighbours as dense
 * indices, couplers per chain; labels and the machine's ranges in the header.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const bytes = await chainsOf(app, actor, partOf(event, 'id'))
  setResponseHeader(event, 'content-type', 'application/octet-stream')
  return bytes
})
