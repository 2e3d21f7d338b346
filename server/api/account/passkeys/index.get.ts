import { passkeysOf } from '../../../services/passkeys'

/** Passkeys of one's own, oldest first, and whether the account has a password as well. */
export default defineSessionRoute('member', (_event, { app, userId }) => passkeysOf(app, userId))
