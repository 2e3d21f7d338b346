import { proofSchema } from '../../../../shared/schemas/passkeys'
import type { ProviderAddress } from '../../../../shared/schemas/identities'
import { beginHandshake } from '../../../services/handshakes'
import { requireProof } from '../../../services/proofs'

/**
 * Where to go for linking one’s account to the outside identity provider: `{current}`, one's password, or `{passkey}` → `{url}`,
 * with a cookie that ties the answer to this browser.
 */
export default defineSessionRoute('member', async (event, { app, userId, sessionId }): Promise<ProviderAddress> => {
  const [site, network] = [siteOf(event), addressOf(event)]
  await requireProof(app, PASSWORDS, { userId, sessionId, network }, await bodyOf(event, proofSchema), site)
  const { url, kept } = await beginHandshake(app, { site, network, next: '/account', userId })
  await keepHandshake(event, kept)
  return { url }
})
