import { createRunSheetSchema } from '../../../shared/schemas/run-sheets'
import { createRunSheet } from '../../services/run-sheets'

/** Prepares a run sheet on a found embedding: 201 `{id, number}`. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const created = await createRunSheet(app, actor, await bodyOf(event, createRunSheetSchema))
  setResponseStatus(event, 201)
  return created
})
