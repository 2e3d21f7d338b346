import { packedChains } from '../../../services/run-sheet-chains'

/**
 * The chains of a run sheet with strength and cut bound, as packed arrays (shared/packed-arrays.ts): qubits, couplers,
 * strength, cutBound, exact, splits, pull and field, one entry a variable (three of splits); labels in the header.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const bytes = await packedChains(app, actor, partOf(event, 'id'))
  setResponseHeader(event, 'content-type', 'application/octet-stream')
  return bytes
})
