import { identityView } from '../../../services/identities'

/** Whether one’s account is linked to the outside identity provider, and has a password. */
export default defineSessionRoute('member', (_event, { app, userId }) => identityView(app, userId))
