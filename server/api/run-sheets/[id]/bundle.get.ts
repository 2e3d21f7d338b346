import { bundleOf } from '../../../services/bundle'

/**
 * ZIP archive with programmed problem, map back, gauges, schedule, settings, checksums and a read-me: the same bytes every
 * time. 409 before approval, saying what to do.
 */
export default defineRoute('member', async (event, { app, ...actor }) => {
  const { fileName, bytes } = await bundleOf(app, actor, partOf(event, 'id'))
  return sendFile(event, fileName, 'application/zip', bytes)
})
