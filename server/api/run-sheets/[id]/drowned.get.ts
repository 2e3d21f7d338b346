import { drownedFile } from '../../../services/precision-view'

/** All coefficients with a scaled size under 2σ, the most drowned first, as CSV. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { fileName, text } = await drownedFile(app, actor, partOf(event, 'id'))
  return sendFile(event, fileName, 'text/csv', text)
})
