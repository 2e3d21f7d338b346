import { makeResetLink } from '../../../services/password-resets'

/** Makes a link for a new password of a member, where no mail is sent → 201 `{link}`, shown this once. */
export default defineSessionRoute(['owner'], async (event, { app, ...actor }) => {
  const made = await makeResetLink(app, actor, partOf(event, 'id'))
  setResponseStatus(event, 201)
  return made
})
