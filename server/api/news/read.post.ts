import { readNewsSchema } from '../../../shared/schemas/news'
import { readAllNews } from '../../services/news'

/**
 * Marks one’s news of the workspace as read, all of it or what was written until a moment: `{upTo?}`. Answers how much is
 * unread after that.
 */
export default defineSessionRoute('member', async (event, { app, ...actor }) => {
  const { upTo } = await bodyOf(event, readNewsSchema)
  return readAllNews(app, actor, upTo)
})
