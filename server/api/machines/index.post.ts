import { createMachineSchema } from '../../../shared/schemas/machines'
import { createMachine } from '../../services/machines'

/** Adds a machine: family with sizes, defects, ranges, control error, timing. 201 `{id, qubits, couplers, calibration}`. */
export default defineRoute(['steward', 'owner'], async (event, { app, ...actor }) => {
  const created = await createMachine(app, actor, await bodyOf(event, createMachineSchema))
  setResponseStatus(event, 201)
  return created
})
