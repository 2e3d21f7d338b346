import { entranceView } from '../services/people'

/** What the sign-in page shows before anyone is signed in. */
export default definePublicRoute((_event, app) => entranceView(app))
