import { unreadNews } from '../../services/news'

/** How much of one’s news of the workspace is unread. */
export default defineSessionRoute('member', (_event, { app, ...actor }) => unreadNews(app, actor))
