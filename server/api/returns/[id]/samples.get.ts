import { samplesFile } from '../../../services/return-files'

/** The raw samples as CSV, as they can be uploaded again. */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { fileName, bytes } = await samplesFile(app, actor, partOf(event, 'id'))
  return sendFile(event, fileName, 'text/csv', bytes)
})
