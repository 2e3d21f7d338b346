import { nextDraftSchema } from '../../../../shared/schemas/return-analysis'
import { nextDraft } from '../../../services/next-draft'

/**
 * Makes a draft run sheet with advice followed: `{items, decode, gap}` → 201 `{id, number, madeFrom, changes}`; with
 * `dryRun` only the changes, 200. 422 for advice that these samples do not give.
 */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const made = await nextDraft(app, actor, partOf(event, 'id'), await bodyOf(event, nextDraftSchema))
  if (made.id === null) noteNothingDone(event)
  else setResponseStatus(event, 201)
  return made
})
