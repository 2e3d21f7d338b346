import { addRemarkSchema } from '../../../../shared/schemas/run-sheets'
import { addRemark } from '../../../services/run-sheet-remarks'

/** `{remark}` → 201 `{at}`, in any state; preparer and reviewer are written to, but for who wrote it. */
export default defineRoute(['developer', 'steward', 'reviewer', 'owner'], async (event, { app, ...actor }) => {
  const { remark } = await bodyOf(event, addRemarkSchema)
  const said = await addRemark(app, actor, partOf(event, 'id'), remark)
  setResponseStatus(event, 201)
  return said
})
