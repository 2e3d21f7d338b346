import { sessionView } from '../services/people'

/** Who is signed in, in which workspace, with which roles; 401 when nobody is. */
export default defineRoute('member', (_event, { app, roles, ...actor }) => sessionView(app, actor, roles))
