import { goToProviderSchema } from '../../../shared/schemas/identities'
import type { ProviderAddress } from '../../../shared/schemas/identities'
import { beginHandshake } from '../../services/handshakes'

/**
 * Where to go for signing in through the outside identity provider: `{next?, invitation?}` → `{url}`, with a cookie that ties
 * the answer to this browser. 409 where there is no provider, or it does not answer; 429 with `Retry-After` in seconds after
 * too many.
 */
export default definePublicRoute(async (event, app): Promise<ProviderAddress> => {
  const input = await bodyOf(event, goToProviderSchema)
  const asked = { ...input, site: siteOf(event), network: addressOf(event), userId: null }
  const { url, kept } = await beginHandshake(app, asked)
  await keepHandshake(event, kept)
  return { url }
})
