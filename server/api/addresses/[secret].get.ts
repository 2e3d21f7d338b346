import { addressView } from '../../services/own-account'

/** Which address a link confirms, by its secret; 404 for any that does not hold. */
export default definePublicRoute((event, app) => addressView(app, partOf(event, 'secret')))
