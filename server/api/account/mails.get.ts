import { mailWishes } from '../../services/mail-wishes'

/** Which kinds of messages of the workspace one gets. */
export default defineSessionRoute('member', (_event, { app, ...actor }) => mailWishes(app, actor))
