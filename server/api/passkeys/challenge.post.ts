import { askPasskey } from '../../services/passkey-checks'

/**
 * Asks for a passkey, to sign in with it or to prove who one is: what the browser needs, to be answered once and within five
 * minutes. 429 with `Retry-After` in seconds after too many.
 */
export default definePublicRoute((event, app) => askPasskey(app, siteOf(event), addressOf(event)))
