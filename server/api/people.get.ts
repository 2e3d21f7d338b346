import { membersOf } from '../services/people'

/** The people of the workspace with their roles. */
export default defineRoute('member', async (_event, { app, ...actor }) => ({
  items: await membersOf(app, actor),
  nextCursor: null,
}))
