import { resetView } from '../../services/password-resets'

/** Whose password a link changes, by its secret; 404 for any that does not hold. */
export default definePublicRoute((event, app) => resetView(app, partOf(event, 'secret')))
