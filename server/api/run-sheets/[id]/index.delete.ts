import { removeRunSheet } from '../../../services/run-sheets'

/** Deletes a draft with its rehearsals. For a minute `POST …/restore` brings it back. */
export default defineRoute(['developer', 'owner'], (event, { app, ...actor }) =>
  removeRunSheet(app, actor, partOf(event, 'id')),
)
