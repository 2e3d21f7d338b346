import { sendRedirect } from 'h3'
import { DomainError } from '../../../shared/errors'
import { finishHandshake } from '../../services/handshakes'
import { enterByProvider, linkIdentity } from '../../services/identities'
import { sessionCaller } from '../../services/sessions'

/**
 * Where the outside identity provider sends people back: signs in, or links an account, and goes on to the page that was
 * wanted; what was refused is said on the page for signing in, or on that of the account.
 */
export default definePublicRoute(async (event, app) => {
  const kept = await takeHandshake(event)
  const { secure } = await getUserSession(event)
  const back = kept?.next === '/account' && secure?.sessionId ? '/account' : '/sign-in'
  try {
    const { who, userId } = await finishHandshake(app, siteOf(event), kept, getRequestURL(event).search)
    if (userId === null) await enter(event, app, await enterByProvider(app, who, kept!.invitation), 'provider')
    else {
      const caller = await sessionCaller(app, secure?.sessionId ?? '', addressOf(event))
      if (caller.userId !== userId)
        throw new DomainError('unauthenticated', 'provider.browser', 'This was begun by somebody else. Begin again.')
      await linkIdentity(app, userId, who)
    }
    return await sendRedirect(event, kept!.next)
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    return sendRedirect(event, `${back}?refused=${error.code}`)
  }
})
