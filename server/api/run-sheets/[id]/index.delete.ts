import { removeRunSheet } from '../../../services/run-sheets'

/** Deletes a draft with its rehearsals. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  await removeRunSheet(app, actor, partOf(event, 'id'))
  return { ok: true }
})
