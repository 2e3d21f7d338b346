import { restore } from '../../../services/deletions'

/** Undoes the deletion of an embedding, whole; 404 once it is gone, 409 while what it stands on is deleted. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  await restore(app, actor, 'embedding', partOf(event, 'id'))
  return { ok: true }
})
