import { restore } from '../../../services/deletions'

/** Undoes the deletion of a problem, whole; 404 once it is gone, 409 while what it stands on is deleted. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  await restore(app, actor, 'problem', partOf(event, 'id'))
  return { ok: true }
})
