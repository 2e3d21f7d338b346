import { duplicateRunSheet } from '../../../services/run-sheet-copies'

/** A new draft with the settings of this run sheet, whatever its state: 201 `{id, number}`. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const copy = await duplicateRunSheet(app, actor, partOf(event, 'id'))
  setResponseStatus(event, 201)
  return copy
})
