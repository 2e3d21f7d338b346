import { embeddingView } from '../../../services/embedding-view'

/** An embedding with its chains by label, statistics, and what stood in the way where none was found. */
export default defineRoute('member', (event, { app, ...actor }) => embeddingView(app, actor, partOf(event, 'id')))
