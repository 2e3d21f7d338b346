import { addRemarkSchema } from '../../../../shared/schemas/run-sheets'
import { addRemark } from '../../../services/run-sheet-remarks'

/**
 * `{remark}` → 201 `{at}`, in any state; preparer, reviewer and members whom it mentions as `@[id]` are written to, but for who
 * wrote it. 422 where somebody is mentioned who is no member.
 */
export default defineRoute(['developer', 'steward', 'reviewer', 'owner'], async (event, { app, ...actor }) => {
  const { remark } = await bodyOf(event, addRemarkSchema)
  const said = await addRemark(app, actor, partOf(event, 'id'), remark)
  setResponseStatus(event, 201)
  return said
})
