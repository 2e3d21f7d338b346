import { readNews } from '../../../services/news'

/** Marks an item of one’s news as read; 404 for any other. Answers how much is unread after that. */
export default defineSessionRoute('member', (event, { app, ...actor }) => readNews(app, actor, partOf(event, 'id')))
