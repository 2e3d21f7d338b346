import { editRunSheetSchema } from '../../../../shared/schemas/run-sheets'
import { editRunSheet, runSheetView } from '../../../services/run-sheets'

/** Changes a draft and answers it as it now stands; 409 from submission on. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const id = partOf(event, 'id')
  await editRunSheet(app, actor, id, await bodyOf(event, editRunSheetSchema))
  return runSheetView(app, actor, id)
})
