import { calibrateSchema } from '../../../../shared/schemas/machines'
import { calibrateMachine } from '../../../services/machines'

/** Saves a changed sheet as a new calibration: what is not given is taken over. 201 `{calibration, invalidated}`. */
export default defineRoute(['steward', 'owner'], async (event, { app, ...actor }) => {
  const saved = await calibrateMachine(app, actor, partOf(event, 'id'), await bodyOf(event, calibrateSchema))
  setResponseStatus(event, 201)
  return saved
})
