import { renameVariablesSchema } from '../../../../shared/schemas/problem-versions'
import { renameVariables } from '../../../services/problem-labels'

/**
 * Renames variables, `{renames: [{from, to}], version?}`, which makes a new version: 201 `{version}`; 422 naming each
 * rename that cannot be made, 409 when `version` is no longer the current one.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const result = await renameVariables(app, actor, partOf(event, 'id'), await bodyOf(event, renameVariablesSchema))
  setResponseStatus(event, 201)
  return result
})
