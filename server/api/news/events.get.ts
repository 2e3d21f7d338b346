import { newsEventsQuerySchema } from '../../../shared/schemas/news'
import { requireShown } from '../../services/workspaces'

/**
 * Server-sent events `news` of how one’s news of the workspace stands: at once, so that nothing is missed by whoever was
 * cut off, then whenever there is more or something was read. The stream ends with the session, and when it goes to
 * another workspace than `?workspace`.
 */
export default defineSessionRoute('member', async (event, { app, ...caller }) => {
  const { workspace } = queryOf(event, newsEventsQuerySchema)
  requireShown(caller, workspace)
  let leave = (): void => {}
  const stream = openEventStream(event, () => leave())
  leave = app.newsWatch.follow({
    ...caller,
    told: (news) => void stream.push({ event: 'news', data: JSON.stringify(news) }).catch(() => stream.close()),
    over: () => void stream.close(),
  })
  return stream.send()
})
