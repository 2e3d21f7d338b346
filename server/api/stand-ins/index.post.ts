import { makeStandInSchema } from '../../../shared/schemas/stand-ins'
import { makeStandIn } from '../../services/stand-ins'

/**
 * Hands the reviews of a reviewer over to another member: `{byId, startsOn, endsOn, forId?}` → 201 `{id}`. 403 for the reviews
 * of others, but by an owner; 409 where they are in other hands on some of these days; 422 for days that do not fit, or somebody
 * who is no reviewer, or no member.
 */
export default defineSessionRoute(['reviewer', 'owner'], async (event, { app, ...asking }) => {
  const made = await makeStandIn(app, asking, await bodyOf(event, makeStandInSchema))
  setResponseStatus(event, 201)
  return made
})
