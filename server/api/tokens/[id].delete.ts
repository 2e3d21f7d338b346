import { revokeToken } from '../../services/tokens'

/** Ends a token at once; owners may end anybody's of the workspace. */
export default defineSessionRoute('member', async (event, { app, ...holder }) => {
  await revokeToken(app, holder, partOf(event, 'id'))
  return { ok: true }
})
