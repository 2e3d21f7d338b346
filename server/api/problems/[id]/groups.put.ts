import { saveGroupsSchema } from '../../../../shared/schemas/groups'
import { putGroups } from '../../../services/problem-groups'

/**
 * Saves the groups of the current version, all at once: `{version?, groups: [{name, kind, k, members, source?}]}` with
 * members by label. 422 names every label and group that cannot be taken, 409 another version; nothing is saved then.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) =>
  putGroups(app, actor, partOf(event, 'id'), await bodyOf(event, saveGroupsSchema)),
)
