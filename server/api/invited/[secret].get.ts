import { invitedView } from '../../services/accept-invitation'

/** What an invitation is for, by the secret of its link; 404 for any that is not open. */
export default definePublicRoute((event, app) => invitedView(app, partOf(event, 'secret')))
